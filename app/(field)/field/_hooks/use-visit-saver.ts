'use client';
import { useEffect, useMemo, useRef, useState } from 'react';
import type { RecordChange } from '@/lib/schema/record-change';
import type { DraftKeeper } from '../_entry/draft-keeper';
import type { ProjectView } from '../_data/project-view';
import { useField } from '../_shell/field-context';

type Waiting = {
  readonly changes: readonly RecordChange[];
  /** Its draft is saved in the same transaction. */
  readonly draft: DraftKeeper | undefined;
  readonly reason: string | undefined;
};

export type SaveState =
  | { readonly kind: 'none' }
  | { readonly kind: 'saving' }
  /** Only after the awaited, strictly durable transaction. */
  | { readonly kind: 'saved'; readonly at: string }
  | { readonly kind: 'failed'; readonly reason: string; readonly waiting: number };

export type VisitSaver = {
  readonly save: (changes: readonly RecordChange[], options?: { draft?: DraftKeeper; reason?: string }) => void;
  readonly idle: () => boolean;
};

/**
 * Saves one batch after the other. A batch that fails stays first in the line and holds back those behind it, so that
 * no value is saved without the record it belongs to; `retry` goes on.
 */
export function useVisitSaver(view: ProjectView, saved: (changes: readonly RecordChange[]) => void): { readonly saver: VisitSaver; readonly state: SaveState; readonly retry: () => void } {
  const { identity } = useField();
  const [state, setState] = useState<SaveState>({ kind: 'none' });
  const waiting = useRef<Waiting[]>([]);
  const running = useRef(false);
  const told = useRef(saved);
  useEffect(() => {
    told.current = saved;
  }, [saved]);

  const { saver, retry } = useMemo(() => {
    const pump = async () => {
      if (running.current) return;
      running.current = true;
      try {
        for (let batch = waiting.current[0]; batch; batch = waiting.current[0]) {
          setState({ kind: 'saving' });
          const draft = batch.draft?.hold();
          let committed = false;
          try {
            await view.commit(batch.changes, identity.userId, { ...(draft ? { draft } : {}), ...(batch.reason ? { reason: batch.reason } : {}) });
            committed = true;
          } finally {
            batch.draft?.release(committed);
          }
          waiting.current.shift();
          told.current(batch.changes);
        }
        setState({ kind: 'saved', at: new Date().toISOString() });
      } catch (error) {
        setState({ kind: 'failed', reason: error instanceof Error ? error.message : String(error), waiting: waiting.current.length });
      } finally {
        running.current = false;
      }
    };
    const saver: VisitSaver = {
      save: (changes, options) => {
        waiting.current.push({ changes, draft: options?.draft, reason: options?.reason });
        void pump();
      },
      idle: () => waiting.current.length === 0,
    };
    return { saver, retry: () => void pump() };
  }, [view, identity.userId]);
  return { saver, state, retry };
}
