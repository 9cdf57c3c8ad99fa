import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

/**
 * From a horizontal length to the one along a slope: the secant of the slope's angle.
 *
 * Not 1 + (s/100)², a factor that circulates for fuel transects and is wrong for plot radii (1.36 against 1.166 at 60 %).
 *
 * @param slopePercent rise over run, %, of the line itself; either sign
 * @returns sqrt(1 + (s/100)²); `not-finite` otherwise
 * @source trigonometry
 * @example slopeFactor(40) // 1.077033
 */
export function slopeFactor(slopePercent: number): Quantity<'not-finite'> {
  return Number.isFinite(slopePercent) ? quantity(Math.hypot(1, slopePercent / 100)) : refuse('not-finite');
}

/**
 * Horizontal distance from one read along a slope.
 *
 * @param slopeDistanceM along the line of sight or tape, m, at least 0
 * @param slopePercent of that line, %; either sign
 * @returns SD / sqrt(1 + (s/100)²), m; refused otherwise
 * @source trigonometry
 * @example horizontalDistance(12.4, 35) // 11.7038 m
 */
export function horizontalDistance(slopeDistanceM: number, slopePercent: number): Quantity<'not-finite' | 'negative'> {
  if (!Number.isFinite(slopeDistanceM)) return refuse('not-finite');
  if (slopeDistanceM < 0) return refuse('negative');
  const factor = slopeFactor(slopePercent);
  return factor.kind === 'refused' ? factor : quantity(slopeDistanceM / factor.value);
}

/**
 * Length to lay out along a slope so that it reaches a horizontal distance.
 *
 * @param horizontalM m, at least 0
 * @param slopePercent of the line laid out, %; either sign
 * @returns m; refused otherwise
 * @source trigonometry
 * @example alongSlope(11.28, 40) // 12.1489 m
 */
export function alongSlope(horizontalM: number, slopePercent: number): Quantity<'not-finite' | 'negative'> {
  if (!Number.isFinite(horizontalM)) return refuse('not-finite');
  if (horizontalM < 0) return refuse('negative');
  const factor = slopeFactor(slopePercent);
  return factor.kind === 'refused' ? factor : quantity(horizontalM * factor.value);
}

/** Slope in % of an angle in degrees; refused from 90 degrees on. @example percentOfDegrees(45) // 100 */
export function percentOfDegrees(degrees: number): Quantity<'not-finite' | 'too-steep'> {
  if (!Number.isFinite(degrees)) return refuse('not-finite');
  return Math.abs(degrees) < 90 ? quantity(100 * Math.tan((degrees * Math.PI) / 180)) : refuse('too-steep');
}
