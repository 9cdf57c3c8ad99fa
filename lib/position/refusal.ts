/** Why there is no result. A refusal takes the place of a number that could not be trusted. */
export type Refused<R extends string> = { readonly kind: 'refused'; readonly reason: R };

/** Builds a refusal. */
export function refuse<R extends string>(reason: R): Refused<R> {
  return { kind: 'refused', reason };
}
