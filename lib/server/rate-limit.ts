import 'server-only';

/** `limit` uses within `windowMs`; going over blocks for `windowMs`, then twice that, and so on up to `longestBlockMs`. */
export type Limit = { readonly limit: number; readonly windowMs: number; readonly longestBlockMs: number };
export type LimitAnswer = { readonly allowed: true } | { readonly allowed: false; readonly retryAfterSeconds: number };

export const MINUTE = 60_000;
export const signInPerAccount: Limit = { limit: 5, windowMs: MINUTE, longestBlockMs: 15 * MINUTE };
export const signInPerAddress: Limit = { limit: 20, windowMs: MINUTE, longestBlockMs: 15 * MINUTE };
export const syncPerDevice: Limit = { limit: 120, windowMs: MINUTE, longestBlockMs: MINUTE };

type Counter = { times: number[]; blockedUntil: number; strikes: number };

// Counters live in the one server process; a restart forgives.
const shared = globalThis as typeof globalThis & { lammasCounters?: Map<string, Counter> };
const MOST_COUNTERS = 20_000;

function counters(): Map<string, Counter> {
  return (shared.lammasCounters ??= new Map());
}

/** Forgets what has expired, then the oldest, so that made-up names cannot fill the memory. */
function makeRoom(all: Map<string, Counter>, now: number): void {
  if (all.size < MOST_COUNTERS) return;
  for (const [key, counter] of all) {
    if (counter.blockedUntil < now && (counter.times.at(-1) ?? 0) < now - 15 * MINUTE) all.delete(key);
  }
  for (const key of all.keys()) {
    if (all.size < MOST_COUNTERS) break;
    all.delete(key);
  }
}

/** Counts one use of `key` and says whether it is within the limit. `now` in milliseconds. */
export function takeTurn(key: string, { limit, windowMs, longestBlockMs }: Limit, now = Date.now()): LimitAnswer {
  const all = counters();
  makeRoom(all, now);
  const counter = all.get(key) ?? { times: [], blockedUntil: 0, strikes: 0 };
  all.set(key, counter);
  const refuse = (): LimitAnswer => ({ allowed: false, retryAfterSeconds: Math.ceil((counter.blockedUntil - now) / 1000) });
  if (now < counter.blockedUntil) return refuse();
  counter.times = counter.times.filter((time) => time > now - windowMs);
  // A quiet stretch as long as the longest block wipes the slate.
  if (counter.times.length === 0 && now - counter.blockedUntil > longestBlockMs) counter.strikes = 0;
  if (counter.times.length >= limit) {
    counter.blockedUntil = now + Math.min(windowMs * 2 ** counter.strikes, longestBlockMs);
    counter.strikes += 1;
    counter.times = [];
    return refuse();
  }
  counter.times.push(now);
  return { allowed: true };
}

/** Forgets the uses of a key, as after a sign-in that succeeded. */
export function forgetTurns(key: string): void {
  counters().delete(key);
}
