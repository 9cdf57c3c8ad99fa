import { PAGE } from '@/lib/schema/wire';
import type { Failure } from './ports';

/** Where a session is (rule 8). */
export type Phase = 'idle' | 'locking' | 'probing' | 'pushing' | 'pulling' | 'backing-off' | 'sign-in-needed';
export type SessionState = {
  readonly phase: Phase;
  /** Most operations in the next push; halved when a push is too much, doubled when one goes through. */
  readonly limit: number;
  /** Failures in a row. */
  readonly failures: number;
  /** Renamings, rewinds and fresh packs in this session; a server that asks for them for ever is a failure. */
  readonly repairs: number;
  /** Something was saved or asked for while busy: go round once more. */
  readonly again: boolean;
  readonly problem: Failure | 'diverged' | null;
};

export type SessionEvent =
  | { readonly kind: 'wanted' }
  | { readonly kind: 'lock-taken' }
  | { readonly kind: 'lock-busy' }
  | { readonly kind: 'reached' }
  | { readonly kind: 'pushed'; readonly more: boolean }
  | { readonly kind: 'forked' }
  | { readonly kind: 'rewound' }
  | { readonly kind: 'pulled'; readonly more: boolean }
  | { readonly kind: 'diverged' }
  | { readonly kind: 'failed'; readonly failure: Failure }
  | { readonly kind: 'due' }
  | { readonly kind: 'signed-in' };

export type Effect =
  | { readonly kind: 'lock' | 'unlock' | 'probe' | 'pull' | 'refetch' | 'rename' | 'finish' }
  | { readonly kind: 'push'; readonly limit: number }
  | { readonly kind: 'wait'; readonly ms: number };
export type Step = { readonly state: SessionState; readonly effects: readonly Effect[] };
/** `random`: uniform in [0, 1), for the length of a wait. */
export type Rule<E extends SessionEvent = SessionEvent> = (state: SessionState, event: E, random: number) => Step;
type EventOf<K extends SessionEvent['kind']> = Extract<SessionEvent, { kind: K }>;
type Table = { readonly [P in Phase]: { readonly [K in SessionEvent['kind']]: Rule<EventOf<K>> } };

export const FIRST_WAIT_MS = 1000;
export const LONGEST_WAIT_MS = 5 * 60_000;
const MOST_REPAIRS = 8;

export const initialSession: SessionState = { phase: 'idle', limit: PAGE, failures: 0, repairs: 0, again: false, problem: null };

/** Full jitter: uniform up to the doubled wait, from 1 s to 5 min, so that a camp's phones do not come back all at once. */
export function waitMs(failures: number, random: number): number {
  const longest = Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** Math.min(failures, 20));
  return Math.round(FIRST_WAIT_MS + random * (longest - FIRST_WAIT_MS));
}

const stay: Rule = (state) => ({ state, effects: [] });
const again: Rule = (state) => ({ state: { ...state, again: true }, effects: [] });
const begin: Rule = (state) => ({ state: { ...state, phase: 'locking', again: false, repairs: 0 }, effects: [{ kind: 'lock' }] });

function backOff(state: SessionState, problem: SessionState['problem'], random: number, unlock: boolean): Step {
  const failures = state.failures + 1;
  return {
    state: { ...state, phase: 'backing-off', failures, problem, again: false },
    effects: [...(unlock ? [{ kind: 'unlock' } as const] : []), { kind: 'wait', ms: waitMs(failures, random) }],
  };
}

const failed: Rule<EventOf<'failed'>> = (state, { failure }, random) =>
  failure === 'sign-in' ? { state: { ...state, phase: 'sign-in-needed', problem: 'sign-in', again: false }, effects: [{ kind: 'unlock' }] }
    : backOff(state, failure, random, true);

/** A push that is too much, or on which the server fails, is tried smaller at once; a single operation waits. */
const pushFailed: Rule<EventOf<'failed'>> = (state, event, random) => {
  const smaller = event.failure === 'too-big' || event.failure === 'server';
  if (!smaller || state.limit === 1) return failed(state, event, random);
  const limit = Math.floor(state.limit / 2);
  return { state: { ...state, limit }, effects: [{ kind: 'push', limit }] };
};

/** After a repair the push starts over; too many of them are a failure. */
function repair(effects: (state: SessionState) => readonly Effect[]): Rule {
  return (state, _, random) => {
    if (state.repairs >= MOST_REPAIRS) return backOff(state, 'diverged', random, true);
    const next: SessionState = { ...state, repairs: state.repairs + 1 };
    return { state: next, effects: effects(next) };
  };
}

const pushOn = ({ limit }: SessionState): readonly Effect[] => [{ kind: 'push', limit }];

const pushed: Rule<EventOf<'pushed'>> = (state, { more }) => {
  const next: SessionState = { ...state, limit: Math.min(PAGE, state.limit * 2), failures: 0 };
  return more ? { state: next, effects: pushOn(next) } : { state: { ...next, phase: 'pulling' }, effects: [{ kind: 'pull' }] };
};

const pulled: Rule<EventOf<'pulled'>> = (state, { more }) => {
  if (more) return { state, effects: [{ kind: 'pull' }] };
  if (state.again) return { state: { ...state, phase: 'pushing', again: false }, effects: pushOn(state) };
  return { state: { ...state, phase: 'idle', failures: 0, problem: null }, effects: [{ kind: 'finish' }, { kind: 'unlock' }] };
};

/** In these phases nothing is under way that could bring such an event: a late one is let pass. */
const quiet = { 'lock-taken': stay, 'lock-busy': stay, reached: stay, pushed: stay, forked: stay, rewound: stay, pulled: stay, diverged: stay, failed: stay } as const;
const busy = { wanted: again, 'signed-in': again, due: stay } as const;

/** All phases × all events. */
export const sessionTable: Table = {
  idle: { ...quiet, wanted: begin, 'signed-in': begin, due: begin },
  'backing-off': { ...quiet, wanted: begin, 'signed-in': begin, due: begin },
  // Recording goes on; asking the server again would only be told the same.
  'sign-in-needed': { ...quiet, wanted: stay, due: stay, 'signed-in': (state, event, random) => begin({ ...state, failures: 0, problem: null }, event, random) },
  locking: {
    ...quiet, ...busy, failed,
    'lock-taken': (state) => ({ state: { ...state, phase: 'probing' }, effects: [{ kind: 'probe' }] }),
    // The other tab does this work.
    'lock-busy': (state) => ({ state: { ...state, phase: 'idle' }, effects: [] }),
  },
  probing: { ...quiet, ...busy, failed, reached: (state) => ({ state: { ...state, phase: 'pushing' }, effects: pushOn(state) }) },
  pushing: {
    ...quiet, ...busy, failed: pushFailed, pushed,
    forked: repair(() => [{ kind: 'rename' }]),
    rewound: repair(pushOn),
  },
  pulling: {
    ...quiet, ...busy, failed, pulled,
    diverged: repair(() => [{ kind: 'refetch' }]),
    // The epoch turned out to be another one while pulling: first push what the restored server lacks.
    rewound: (state, event, random) => repair(pushOn)({ ...state, phase: 'pushing' }, event, random),
  },
};

/** The next state of a session and what is to be done; nothing else is looked at. */
export function step(state: SessionState, event: SessionEvent, random: number): Step {
  // The table pairs each kind with its own rule; the compiler cannot follow that through an index.
  const rule = sessionTable[state.phase][event.kind] as Rule;
  return rule(state, event, random);
}
