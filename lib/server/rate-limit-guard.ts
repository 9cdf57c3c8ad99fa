import 'server-only';
import { Problem } from './errors';
import { takeTurn } from './rate-limit';
import type { Limit } from './rate-limit';

/** Counts one use of `key`. Errors: Problem `too-many-requests` with Retry-After. */
export function enforceLimit(key: string, limit: Limit): void {
  const answer = takeTurn(key, limit);
  if (!answer.allowed) throw new Problem('too-many-requests', { headers: { 'Retry-After': String(answer.retryAfterSeconds) } });
}
