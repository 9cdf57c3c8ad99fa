import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

/** Square feet in an acre, exact. */
export const SQUARE_FEET_PER_ACRE = 43_560;
/** Square metres in a hectare, exact. */
export const SQUARE_METRES_PER_HECTARE = 10_000;

const positive = (value: number): boolean => Number.isFinite(value) && value > 0;

/**
 * Radius of a circular plot from its area.
 *
 * Metric plots are given in m² and get metres; US ones in acres and get feet. Horizontal, as all plot areas are.
 *
 * @param area m² (metric) or acres (us), above 0
 * @returns m or ft, unrounded; `not-positive` otherwise
 * @source geometry of the circle, r = sqrt(A/pi)
 * @example plotRadius(400, 'metric') // 11.2838 m
 */
export function plotRadius(area: number, system: 'metric' | 'us'): Quantity<'not-positive'> {
  if (!positive(area)) return refuse('not-positive');
  return quantity(Math.sqrt((system === 'metric' ? area : area * SQUARE_FEET_PER_ACRE) / Math.PI));
}

/**
 * Area of a circular plot from the radius laid out.
 *
 * A rounded radius makes another area: 11.28 m is 399.73 m², not 400. The project locks which of the two counts.
 *
 * @param radius m (metric) or ft (us), above 0
 * @returns m² or acres; `not-positive` otherwise
 * @source geometry of the circle, A = pi r²
 * @example plotArea(11.28, 'metric') // 399.7312 m²
 */
export function plotArea(radius: number, system: 'metric' | 'us'): Quantity<'not-positive'> {
  if (!positive(radius)) return refuse('not-positive');
  const area = Math.PI * radius ** 2;
  return quantity(system === 'metric' ? area : area / SQUARE_FEET_PER_ACRE);
}
