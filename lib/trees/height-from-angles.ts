import { refuse } from './refusal';
import type { Refused } from './refusal';

/** Circumstances under which a height by angles is worth little, for a second look and not a refusal. */
export type HeightCaution = 'steep-angle' | 'closer-than-height';
export type HeightByAngles = { readonly kind: 'height'; readonly heightM: number; readonly cautions: readonly HeightCaution[] };
export type HeightRefusal = 'bad-distance' | 'bad-angle' | 'top-not-above-base' | 'bad-pole';

const radiansPerDegree = Math.PI / 180;
/** Beyond this the error of an angle grows fast: 5.4 % of the height per degree at 70, 3.5 % at 45. */
const STEEP_DEG = 60;
const isAngle = (degrees: number): boolean => Number.isFinite(degrees) && Math.abs(degrees) < 90;
const isLength = (metres: number): boolean => Number.isFinite(metres) && metres > 0;

function height(heightM: number, steepestDeg: number, horizontalM: number | null): HeightByAngles | Refused<HeightRefusal> {
  if (!(heightM > 0)) return refuse('top-not-above-base');
  return {
    kind: 'height', heightM,
    cautions: [
      ...(steepestDeg > STEEP_DEG ? ['steep-angle' as const] : []),
      ...(horizontalM !== null && horizontalM < heightM ? ['closer-than-height' as const] : []),
    ],
  };
}

/**
 * Height by two angles and a horizontal distance (tangent method).
 *
 * Assumes that the top stands vertically over the base: a lean of 8 degrees towards the observer adds 15 % to a 20 m
 * tree seen from 20 m.
 *
 * @param horizontalM from the eye to the stem, m; a slope distance goes through `horizontalOfDegrees` first
 * @param topDeg up is positive, degrees
 * @param baseDeg down is negative, degrees
 * @returns m, D (tan top - tan base), with cautions over 60 degrees or closer than the height
 * @source trigonometry; cautions: standards of the trade (angle near 45 degrees is best)
 * @example heightByTangents(20, 38, -4) // 17.02425 m
 */
export function heightByTangents(horizontalM: number, topDeg: number, baseDeg: number): HeightByAngles | Refused<HeightRefusal> {
  if (!isLength(horizontalM)) return refuse('bad-distance');
  if (!isAngle(topDeg) || !isAngle(baseDeg)) return refuse('bad-angle');
  const heightM = horizontalM * (Math.tan(topDeg * radiansPerDegree) - Math.tan(baseDeg * radiansPerDegree));
  return height(heightM, Math.max(Math.abs(topDeg), Math.abs(baseDeg)), horizontalM);
}

/**
 * Height by two readings in percent and a horizontal distance. Same assumptions and cautions as `heightByTangents`.
 *
 * @param horizontalM m; with feet in, feet come out
 * @param topPercent up is positive, %
 * @param basePercent down is negative, %
 * @returns D (top - base)/100
 * @source trigonometry
 * @example heightByPercents(25, 62, -8) // 17.5 m
 */
export function heightByPercents(horizontalM: number, topPercent: number, basePercent: number): HeightByAngles | Refused<HeightRefusal> {
  if (!isLength(horizontalM)) return refuse('bad-distance');
  if (!Number.isFinite(topPercent) || !Number.isFinite(basePercent)) return refuse('bad-angle');
  const steepest = Math.atan(Math.max(Math.abs(topPercent), Math.abs(basePercent)) / 100) / radiansPerDegree;
  return height((horizontalM * (topPercent - basePercent)) / 100, steepest, horizontalM);
}

/**
 * Height by two slope distances and their angles (sine method).
 *
 * Needs no vertical alignment of top and base, and measures a real point of the crown, so it cannot overestimate apart
 * from instrument error.
 *
 * @param top distance to the top, m, and its angle, degrees
 * @param base distance to the base, m, and its angle, degrees
 * @returns m, L1 sin(top) - L2 sin(base)
 * @source Bragg 2008; Bragg et al. 2011, USDA Forest Service Research Note SRS-22
 * @example heightBySines({ distanceM: 32, angleDeg: 40 }, { distanceM: 24.6, angleDeg: -5 }) // 22.71323 m
 */
export function heightBySines(
  top: { readonly distanceM: number; readonly angleDeg: number }, base: { readonly distanceM: number; readonly angleDeg: number },
): HeightByAngles | Refused<HeightRefusal> {
  if (!isLength(top.distanceM) || !isLength(base.distanceM)) return refuse('bad-distance');
  if (!isAngle(top.angleDeg) || !isAngle(base.angleDeg)) return refuse('bad-angle');
  const rise = (shot: typeof top) => shot.distanceM * Math.sin(shot.angleDeg * radiansPerDegree);
  return height(rise(top) - rise(base), Math.max(Math.abs(top.angleDeg), Math.abs(base.angleDeg)), null);
}

/**
 * Height by a pole of known length held upright at the stem, without a distance.
 *
 * @param poleM length from the base of the stem to the pole's top, m
 * @param topPercent reading to the tree's top, %
 * @param polePercent reading to the pole's top, %
 * @param basePercent reading to the base, %
 * @returns m, pole (top - base)/(pole reading - base)
 * @source trigonometry
 * @example heightByPole(2, 55, -2, -12) // 13.4 m
 */
export function heightByPole(poleM: number, topPercent: number, polePercent: number, basePercent: number): HeightByAngles | Refused<HeightRefusal> {
  if (!isLength(poleM)) return refuse('bad-distance');
  if (![topPercent, polePercent, basePercent].every(Number.isFinite)) return refuse('bad-angle');
  if (!(polePercent > basePercent)) return refuse('bad-pole');
  const steepest = Math.atan(Math.max(Math.abs(topPercent), Math.abs(basePercent)) / 100) / radiansPerDegree;
  return height((poleM * (topPercent - basePercent)) / (polePercent - basePercent), steepest, null);
}

/**
 * Horizontal distance of one measured along a line of sight at an angle.
 *
 * @returns m, L cos(angle)
 * @source trigonometry
 * @example horizontalOfDegrees(30, -12) // 29.34443 m
 */
export function horizontalOfDegrees(slopeM: number, angleDeg: number): { readonly kind: 'value'; readonly value: number } | Refused<'bad-distance' | 'bad-angle'> {
  if (!isLength(slopeM)) return refuse('bad-distance');
  if (!isAngle(angleDeg)) return refuse('bad-angle');
  return { kind: 'value', value: slopeM * Math.cos(angleDeg * radiansPerDegree) };
}
