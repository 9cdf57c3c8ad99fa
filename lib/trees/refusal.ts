/** Why there is no result. A refusal takes the place of a number that could not be trusted. */
export type Refused<R extends string> = { readonly kind: 'refused'; readonly reason: R };
/** One number, or why there is none. */
export type Quantity<R extends string> = { readonly kind: 'value'; readonly value: number } | Refused<R>;

/** Builds a refusal. */
export function refuse<R extends string>(reason: R): Refused<R> {
  return { kind: 'refused', reason };
}

/** Builds a result; a number that is not finite is a bug of the caller, since refusals come first. */
export function quantity(value: number): { readonly kind: 'value'; readonly value: number } {
  if (!Number.isFinite(value)) throw new RangeError('quantity: not a finite number');
  return { kind: 'value', value };
}
