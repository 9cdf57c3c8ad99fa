import 'client-only';
import { SyncEngine } from '@/lib/sync/engine';
import type { Phase, SessionState } from '@/lib/sync/machine';
import type { LockPort, Transport } from '@/lib/sync/ports';
import type { FieldStore, QueueState } from './field-store-types';
import { syncStoreOf } from './field-store';
import { makeTransport } from './transport';

const AFTER_SAVE_MS = 2000;
const EVERY_MS = 60_000;
const LOCK_NAME = 'lammas-sync';

export type SyncStatus = {
  readonly phase: Phase;
  readonly lastSyncAt: string | null;
  readonly unsent: number;
  readonly problem: SessionState['problem'];
};

export type SyncHandle = {
  /** Syncs now; resolves when this round has ended, however it ended: see `status`. */
  syncNow(): Promise<void>;
  /** Somebody signed in again. */
  signedIn(): Promise<void>;
  status(): SyncStatus;
  /** Called at each change of the status. Returns the way to stop. */
  subscribe(listener: (status: SyncStatus) => void): () => void;
  stop(): void;
};

/** One tab at a time, by Web Locks; where a browser has none, the server's answers to replays keep two tabs harmless. */
const webLock: LockPort = {
  take: () => {
    if (typeof navigator === 'undefined' || !('locks' in navigator)) return Promise.resolve(() => undefined);
    return new Promise((resolve, reject) => {
      navigator.locks.request(LOCK_NAME, { ifAvailable: true }, (lock) => {
        if (!lock) return resolve(null);
        return new Promise<void>((release) => resolve(release));
      }).catch(reject);
    });
  },
};

function later(ms: number, callback: () => void): () => void {
  const timer = setTimeout(callback, ms);
  return () => clearTimeout(timer);
}

/**
 * Keeps an opened store in step with the server: at once, when the network or the page comes back, 2 s after a save,
 * every 60 s while visible, and on `syncNow`. Recording never waits for it.
 */
export function startSync(store: FieldStore, { transport = makeTransport(), lock = webLock }: { readonly transport?: Transport; readonly lock?: LockPort } = {}): SyncHandle {
  const listeners = new Set<(status: SyncStatus) => void>();
  let queue: QueueState = { unsent: 0, lastSyncAt: null, quarantined: [] };
  let stopped = false;
  const engine = new SyncEngine({
    store: syncStoreOf(store), transport, lock, later, random: Math.random, report: () => tell(),
    log: (what, cause) => console.warn(`[sync] ${what}`, ...(cause === undefined ? [] : [cause])),
  });
  const status = (): SyncStatus => ({ phase: engine.state.phase, problem: engine.state.problem, lastSyncAt: queue.lastSyncAt, unsent: queue.unsent });
  function tell(): void {
    const now = status();
    for (const listener of listeners) listener(now);
  }
  const send = async (kind: 'wanted' | 'signed-in') => {
    if (!stopped) await engine.send({ kind });
    await count();
  };
  const fault = (error: unknown) => console.warn('[sync] the device store failed', error);
  const want = () => void send('wanted').catch(fault);

  let stopTimer: (() => void) | null = null;
  async function count(): Promise<void> {
    const before = queue.unsent;
    queue = await store.queue();
    tell();
    // A save while a session runs is seen by that session, or waits for these two seconds.
    if (queue.unsent > before && !stopped) {
      stopTimer?.();
      stopTimer = later(AFTER_SAVE_MS, want);
    }
  }
  const unsubscribe = store.subscribe(() => void count().catch(fault));

  const visible = () => typeof document === 'undefined' || document.visibilityState === 'visible';
  const onVisible = () => { if (visible()) want(); };
  const onClock = () => { if (visible() && engine.state.phase !== 'backing-off') want(); };
  const clock = setInterval(onClock, EVERY_MS);
  if (typeof window !== 'undefined') {
    window.addEventListener('online', want);
    document.addEventListener('visibilitychange', onVisible);
  }
  want();

  return {
    // A person who asks may have signed in elsewhere meanwhile.
    syncNow: () => send(engine.state.phase === 'sign-in-needed' ? 'signed-in' : 'wanted'),
    signedIn: () => send('signed-in'),
    status,
    subscribe: (listener) => {
      listeners.add(listener);
      return () => { listeners.delete(listener); };
    },
    stop: () => {
      stopped = true;
      clearInterval(clock);
      stopTimer?.();
      engine.stop();
      unsubscribe();
      if (typeof window === 'undefined') return;
      window.removeEventListener('online', want);
      document.removeEventListener('visibilitychange', onVisible);
    },
  };
}
