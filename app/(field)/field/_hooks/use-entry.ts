'use client';
import { useCallback, useEffect, useRef, useState } from 'react';
import { v7 } from 'uuid';
import type { RecordChange } from '@/lib/schema/record-change';
import { parseDraft } from '../_entry/entry-draft';
import { inverse } from '../_entry/inverse';
import { anotherStemEntry, knownStemEntry, knownStems, newTreeEntry, nextEntry, storedEntry, withNewIds } from '../_entry/next-entry';
import { openQuestion } from '../_entry/raise-looks';
import { restoreDraft } from '../_entry/restore-draft';
import { transition } from '../_entry/transition';
import type { EntryEvent, EntryPorts, EntryState } from '../_entry/types';
import { applyChanges } from '../_data/project-records';
import type { ProjectRecords } from '../_data/project-records';
import type { VisitSaver } from './use-visit-saver';
import { useEntryDraft } from './use-entry-draft';

const PAUSE_MS = 1500;
const KEPT_UNDOS = 20;

type Visited = { readonly id: string; readonly projectId: string; readonly plotId: string };
type Undo = { readonly before: EntryState; readonly changes: readonly RecordChange[]; readonly records: ProjectRecords };

export type Entry = {
  readonly state: EntryState;
  readonly send: (event: EntryEvent) => void;
  readonly nextTree: () => void;
  readonly anotherStem: () => void;
  /** Puts a measured stem on the card. */
  readonly open: (measurementId: string) => void;
  readonly chooseKnown: (stemId: string) => void;
  readonly chooseNew: () => void;
  readonly undo: (() => void) | null;
  /** What is typed stands; the stem stays on the card. For leaving the page by its own buttons. */
  readonly settle: () => void;
  /** Saves changes that do not come from the card (a deletion, a restoration). */
  readonly change: (changes: readonly RecordChange[], reason: string) => void;
};

/**
 * The entry card of a visit: events go through the pure transition, its changes to the saver, what is typed to the
 * draft. Null until the draft was read.
 */
export function useEntry(visit: Visited, records: ProjectRecords, ports: EntryPorts | null, saver: VisitSaver): Entry | null {
  const [state, setState] = useState<EntryState | null>(null);
  const [undos, setUndos] = useState<readonly Undo[]>([]);
  const now = useRef<EntryState | null>(null);
  const typedHere = useRef(false);
  /** Records with the changes under way, for tags and order only; the screen shows what is saved. */
  const ahead = useRef(records);
  const stored = useRef(records);
  useEffect(() => {
    stored.current = records;
    if (saver.idle()) ahead.current = records;
  }, [records, saver]);

  const show = useCallback((next: EntryState) => {
    now.current = next;
    setState(next);
  }, []);
  const draft = useEntryDraft(visit, state);

  useEffect(() => {
    let gone = false;
    void draft.read().then((body) => {
      if (gone || now.current) return;
      const kept = parseDraft(body);
      show((kept && restoreDraft(kept, stored.current)) ?? nextEntry(stored.current, visit, v7));
    });
    return () => {
      gone = true;
    };
  }, [draft, show, visit]);

  const persist = useCallback((before: EntryState, changes: readonly RecordChange[], reason?: string) => {
    if (changes.length === 0) return;
    const former = ahead.current;
    ahead.current = applyChanges(former, changes);
    setUndos((kept) => [...kept, { before, changes, records: former }].slice(-KEPT_UNDOS));
    saver.save(changes, { draft, ...(reason ? { reason } : {}) });
  }, [draft, saver]);

  const send = useCallback((event: EntryEvent) => {
    const before = now.current;
    if (!before || !ports) return;
    typedHere.current = typedHere.current || event.kind === 'type' || event.kind === 'key' || event.kind === 'erase';
    const step = transition(before, event, ports);
    now.current = step.state;
    draft.note(step.state);
    persist(before, step.changes);
    show(step.done ? nextEntry(ahead.current, visit, v7) : step.state);
  }, [ports, persist, show, visit, draft]);

  /** Leaves the stem on the card for another one. */
  const leaveFor = useCallback((choose: (left: EntryState) => EntryState | null) => {
    const before = now.current;
    if (!before || !ports) return;
    const step = transition(before, { kind: 'close' }, ports);
    now.current = step.state;
    draft.note(step.state);
    persist(before, step.changes);
    show(choose(step.state) ?? nextEntry(ahead.current, visit, v7));
  }, [ports, persist, show, visit, draft]);

  useEffect(() => {
    // Digits that a draft brought back wait for the person; only what is typed now comes to stand by a pause.
    if (!typedHere.current || !state?.typing || state.typing.digits === '' || state.panel.kind !== 'pad') return;
    const timer = setTimeout(() => send({ kind: 'pause' }), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [state?.typing, state?.panel.kind, send]);

  const undo = useCallback(() => {
    const last = undos.at(-1);
    if (!last) return;
    const back = inverse(last.changes, (entity, id) => (last.records as Partial<Record<string, ReadonlyMap<string, object>>>)[entity]?.get(id) as Readonly<Record<string, unknown>> | undefined ?? null);
    ahead.current = applyChanges(ahead.current, back);
    setUndos((kept) => kept.slice(0, -1));
    // What was typed is not put back: by itself it would come to stand again after a pause.
    const question = openQuestion(last.before.looks);
    show({ ...withNewIds(last.before, v7), typing: null, goesOn: null, panel: question ? { kind: 'doubt', lookId: question.id } : { kind: 'pad' } });
    saver.save(back, { draft, reason: 'Undone' });
  }, [undos, show, saver, draft]);

  if (!state || !ports) return null;
  return {
    state, send,
    nextTree: () => {
      const typing = now.current?.panel.kind === 'pad' ? now.current.typing : null;
      // What was only just typed is asked about once before the tree is left; a second tap goes on.
      if (typing) send({ kind: 'leave', quantity: typing.quantity });
      if (typing && (now.current?.panel.kind === 'doubt' || now.current?.panel.kind === 'origin')) return;
      leaveFor(() => null);
    },
    anotherStem: () => leaveFor((left) => (left.saved.tree ? anotherStemEntry(ahead.current, visit, left, v7) : left)),
    open: (measurementId) => leaveFor(() => storedEntry(ahead.current, measurementId)),
    chooseKnown: (stemId) => leaveFor(() => {
      const known = knownStems(ahead.current, visit.plotId, visit.id).find(({ stem }) => stem.id === stemId);
      return known ? knownStemEntry(ahead.current, visit, known, v7) : null;
    }),
    settle: () => leaveFor((left) => left),
    chooseNew: () => leaveFor(() => newTreeEntry(ahead.current, visit, v7)),
    undo: undos.length > 0 ? undo : null,
    change: (changes, reason) => {
      const before = now.current;
      if (!before) return;
      persist(before, changes, reason);
      // The stem on the card may be the one that went.
      const gone = changes.some(({ recordId, kind }) => kind === 'delete' && recordId === before.measurement.id);
      if (gone) show(nextEntry(ahead.current, visit, v7));
    },
  };
}
