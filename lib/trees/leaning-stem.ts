import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

/**
 * Length of a leaning stem from its vertical height and how far its tip hangs over.
 *
 * Assumes a straight stem. A lean of up to 8 degrees changes height against length by less than 1 %.
 *
 * @param verticalM m, above 0
 * @param offsetM horizontal, from base to below the tip, m
 * @returns sqrt(v² + offset²), m
 * @source Brack and Wood 1998, Forest Mensuration (Australian National University)
 * @example leaningStemLength(19.80536, 2.78346) // 20 m
 */
export function leaningStemLength(verticalM: number, offsetM: number): Quantity<'bad-length'> {
  if (!(Number.isFinite(verticalM) && verticalM > 0 && Number.isFinite(offsetM))) return refuse('bad-length');
  return quantity(Math.hypot(verticalM, offsetM));
}
