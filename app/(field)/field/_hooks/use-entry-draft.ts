'use client';
import { useEffect, useMemo } from 'react';
import { DraftKeeper } from '../_entry/draft-keeper';
import type { EntryState } from '../_entry/types';
import { useField } from '../_shell/field-context';

/** The keeper of a visit's draft, told of each state of the card; what is typed is kept when the page is left or hidden. */
export function useEntryDraft(visit: { readonly id: string; readonly projectId: string }, state: EntryState | null): DraftKeeper {
  const { store } = useField();
  const keeper = useMemo(() => new DraftKeeper(store, visit), [store, visit]);
  useEffect(() => {
    if (state) keeper.offer(state);
  }, [keeper, state]);
  useEffect(() => {
    const hidden = () => {
      if (document.visibilityState === 'hidden') keeper.flush();
    };
    window.addEventListener('pagehide', keeper.flush);
    window.addEventListener('blur', keeper.flush);
    document.addEventListener('visibilitychange', hidden);
    return () => {
      window.removeEventListener('pagehide', keeper.flush);
      window.removeEventListener('blur', keeper.flush);
      document.removeEventListener('visibilitychange', hidden);
      keeper.flush();
    };
  }, [keeper]);
  return keeper;
}
