import { R95_PER_DRMS, R95_PER_SIGMA } from './circular-normal';
import { refuse } from './refusal';
import type { Refused } from './refusal';

export type NssdaResult = {
  readonly kind: 'nssda'; readonly n: number;
  readonly rmseX: number; readonly rmseY: number; readonly rmseR: number;
  /** 95 % horizontal accuracy where both axes have equal error: 1.7308 rmseR. */
  readonly accuracyEqualAxes: number;
  /** 95 % horizontal accuracy where they differ (smaller over larger 0.6 to 1): 2.4477 times the mean of both. */
  readonly accuracyUnequalAxes: number;
};

/**
 * Horizontal accuracy of positions against independent check points, as the US national standard has it.
 *
 * Assumes normal errors without blunders and a check source at least three times better. At least 20 points; with 20,
 * one may miss. The result includes bias, since it rests on root mean squares about zero.
 *
 * @param dx differences in easting, m (or any one unit)
 * @param dy differences in northing, same points and unit
 * @returns root mean squares and both accuracies; refused for fewer than 20 points, unequal lengths, axes too unequal
 * @source FGDC-STD-007.3-1998, National Standard for Spatial Data Accuracy, 3.2 and appendix 3-A
 * @example nssda(dx, dy)
 */
export function nssda(dx: readonly number[], dy: readonly number[]): NssdaResult | Refused<'unequal-lengths' | 'too-few-points' | 'not-finite' | 'axes-too-unequal'> {
  if (dx.length !== dy.length) return refuse('unequal-lengths');
  if (dx.length < 20) return refuse('too-few-points');
  if (![...dx, ...dy].every(Number.isFinite)) return refuse('not-finite');
  const rms = (values: readonly number[]) => Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);
  const rmseX = rms(dx), rmseY = rms(dy);
  const larger = Math.max(rmseX, rmseY);
  if (larger > 0 && Math.min(rmseX, rmseY) / larger < 0.6) return refuse('axes-too-unequal');
  const rmseR = Math.hypot(rmseX, rmseY);
  return { kind: 'nssda', n: dx.length, rmseX, rmseY, rmseR, accuracyEqualAxes: R95_PER_DRMS * rmseR, accuracyUnequalAxes: (R95_PER_SIGMA * (rmseX + rmseY)) / 2 };
}
