import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

/** m² per cm² of diameter, pi/40,000. */
export const M2_PER_CM2 = Math.PI / 40_000;

/**
 * Basal area of one stem: the area of a circle of its diameter.
 *
 * @param dbhCm cm, above 0
 * @returns m²; `bad-dbh` otherwise
 * @source definition
 * @example basalArea(30) // 0.0706858 m²
 */
export function basalArea(dbhCm: number): Quantity<'bad-dbh'> {
  return Number.isFinite(dbhCm) && dbhCm > 0 ? quantity(M2_PER_CM2 * dbhCm ** 2) : refuse('bad-dbh');
}

/**
 * Diameter at the root collar of a stem with several shoots: the one whose area equals theirs together.
 *
 * @param diametersCm any one unit, at least one, each above 0
 * @returns sqrt of the sum of squares, same unit
 * @source FIA Database User Guide 9.3 (2024), section 3.1.18
 * @example combinedDiameter([4, 3, 5]) // 7.0711
 */
export function combinedDiameter(diametersCm: readonly number[]): Quantity<'no-diameters' | 'bad-dbh'> {
  if (diametersCm.length === 0) return refuse('no-diameters');
  if (!diametersCm.every((d) => Number.isFinite(d) && d > 0)) return refuse('bad-dbh');
  return quantity(Math.sqrt(diametersCm.reduce((sum, d) => sum + d * d, 0)));
}
