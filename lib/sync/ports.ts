import type { PullReply, PushProblem, PushReply, PushRequest, WorkPack } from '@/lib/schema/wire';

/**
 * Why there is no answer from the server. `offline`: no answer at all. `not-ours`: something answered that is not the
 * server (a network's log-in page). `too-big`: 413. `server`: 5xx. `busy`: 429, wait. `sign-in`: 401.
 * `denied`: 403 or 404, no access to what was asked for. `refused`: anything else.
 */
export type Failure = 'offline' | 'not-ours' | 'too-big' | 'server' | 'busy' | 'sign-in' | 'denied' | 'refused';
export type Answer<T> = { readonly kind: 'ok'; readonly reply: T } | { readonly kind: Failure };
export type PushAnswer = Answer<PushReply> | { readonly kind: 'problem'; readonly problem: PushProblem };

/** What goes over the network. Nothing here rejects; every outcome is an answer. */
export interface Transport {
  probe(): Promise<Answer<null>>;
  push(request: PushRequest): Promise<PushAnswer>;
  pull(projectId: string, cursor: number): Promise<Answer<PullReply>>;
  pack(projectId: string): Promise<Answer<WorkPack>>;
}

export type Held = { readonly projectId: string; readonly cursor: number; readonly stale: boolean };

/** What the session needs of a device's store; each call is one transaction. */
export interface SyncStore {
  /** The next unsent operations, at most `limit`; null when there are none. */
  batch(limit: number): Promise<PushRequest | null>;
  /** `mismatch`: the answer's hash is not ours there; nothing was forgotten. */
  acknowledge(reply: PushReply): Promise<'taken' | 'mismatch'>;
  /** Takes a new device id and chains all operations anew under the same opIds; all are unsent then. */
  rename(): Promise<void>;
  /** Goes back (or forward) to what the server has. `mismatch`: its hash is not ours there. */
  rewind(problem: Pick<PushProblem, 'code' | 'epoch' | 'ackSeq' | 'ackHash'>): Promise<'taken' | 'mismatch'>;
  projects(): Promise<readonly Held[]>;
  absorbPage(from: number, page: PullReply): Promise<'taken' | 'ignored' | 'diverged'>;
  absorbPack(pack: WorkPack): Promise<void>;
  epoch(): Promise<string | null>;
  /** All there was to exchange has been exchanged. */
  finished(): Promise<void>;
}

/** Lets one tab at a time sync. Null: another has it. */
export interface LockPort {
  take(): Promise<(() => void) | null>;
}
