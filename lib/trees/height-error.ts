import { refuse } from './refusal';
import type { Refused } from './refusal';

export type HeightError = {
  readonly kind: 'height-error';
  /** Metres of height per degree of error in the top and the base angle. */
  readonly perTopDegreeM: number;
  readonly perBaseDegreeM: number;
  /** Metres of height per metre of error in the distance. */
  readonly perMetre: number;
  /** Standard deviation of the height, m. */
  readonly sigmaM: number;
};

/**
 * Expected random error of a height by the tangent method.
 *
 * First-order propagation with independent errors: a common offset of both angles, a drifted instrument or a leaning
 * tree is not in it.
 *
 * @param horizontalM m
 * @param topDeg degrees
 * @param baseDeg degrees
 * @param sigmaAngleDeg standard deviation of one angle, degrees, at least 0
 * @param sigmaDistanceM standard deviation of the distance, m, at least 0
 * @returns partial derivatives and standard deviation
 * @source propagation of error: (D sec² a s)² + (D sec² b s)² + ((h/D) s_D)²
 * @example heightError(20, 38, -4, 0.5, 0.1) // sigma 0.342061 m
 */
export function heightError(horizontalM: number, topDeg: number, baseDeg: number, sigmaAngleDeg: number, sigmaDistanceM: number): HeightError | Refused<'bad-distance' | 'bad-angle' | 'bad-sigma'> {
  if (!(Number.isFinite(horizontalM) && horizontalM > 0)) return refuse('bad-distance');
  if (!(Math.abs(topDeg) < 90 && Math.abs(baseDeg) < 90)) return refuse('bad-angle');
  if (!(Number.isFinite(sigmaAngleDeg) && sigmaAngleDeg >= 0 && Number.isFinite(sigmaDistanceM) && sigmaDistanceM >= 0)) return refuse('bad-sigma');
  const radians = Math.PI / 180;
  const perDegree = (angle: number) => (horizontalM * radians) / Math.cos(angle * radians) ** 2;
  const perTopDegreeM = perDegree(topDeg), perBaseDegreeM = perDegree(baseDeg);
  const perMetre = Math.tan(topDeg * radians) - Math.tan(baseDeg * radians);
  return {
    kind: 'height-error', perTopDegreeM, perBaseDegreeM, perMetre,
    sigmaM: Math.hypot(perTopDegreeM * sigmaAngleDeg, perBaseDegreeM * sigmaAngleDeg, perMetre * sigmaDistanceM),
  };
}
