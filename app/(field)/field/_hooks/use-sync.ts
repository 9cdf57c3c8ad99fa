'use client';
import { useCallback, useEffect, useMemo, useState } from 'react';
import type { FieldStore } from '@/lib/client/field-store-types';
import type { SyncHandle, SyncStatus } from '@/lib/client/start-sync';

export type FieldSync = {
  /** Null until the engine has been loaded. */
  readonly status: SyncStatus | null;
  readonly syncNow: () => Promise<void>;
  /** The session is good again. */
  readonly signedIn: () => Promise<void>;
};

/** Keeps this device in step with the server while somebody is signed in on it; recording never waits for it. */
export function useSync(store: FieldStore | null, userId: string | null): FieldSync {
  const [handle, setHandle] = useState<SyncHandle | null>(null);
  const [status, setStatus] = useState<SyncStatus | null>(null);
  useEffect(() => {
    if (!store || userId === null) return;
    let gone = false;
    let started: SyncHandle | null = null;
    void import('@/lib/client/start-sync').then(({ startSync }) => {
      if (gone) return;
      started = startSync(store);
      started.subscribe(setStatus);
      setHandle(started);
      setStatus(started.status());
    });
    return () => {
      gone = true;
      started?.stop();
      setHandle(null);
      setStatus(null);
    };
  }, [store, userId]);
  const syncNow = useCallback(async () => handle?.syncNow(), [handle]);
  const signedIn = useCallback(async () => handle?.signedIn(), [handle]);
  return useMemo(() => ({ status, syncNow, signedIn }), [status, syncNow, signedIn]);
}
