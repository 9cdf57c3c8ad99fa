import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

/**
 * How far an error of azimuth moves a tree sideways: along the arc, and straight.
 *
 * @param distanceM horizontal, m, at least 0
 * @param errorDeg degrees; its sign does not matter; at most 180
 * @returns m
 * @source geometry of the circle: arc D·theta, chord 2 D sin(theta/2)
 * @example azimuthErrorArc(17.95272, 10) // 3.1333 m
 */
export function azimuthErrorArc(distanceM: number, errorDeg: number): Quantity<'bad-distance' | 'bad-angle'> {
  return shift(distanceM, errorDeg, (theta) => theta);
}

/** The same as `azimuthErrorArc`, straight from the true to the wrong place. @example azimuthErrorChord(17.95272, 10) // 3.1294 m */
export function azimuthErrorChord(distanceM: number, errorDeg: number): Quantity<'bad-distance' | 'bad-angle'> {
  return shift(distanceM, errorDeg, (theta) => 2 * Math.sin(theta / 2));
}

function shift(distanceM: number, errorDeg: number, perMetre: (theta: number) => number): Quantity<'bad-distance' | 'bad-angle'> {
  if (!(Number.isFinite(distanceM) && distanceM >= 0)) return refuse('bad-distance');
  if (!(Math.abs(errorDeg) <= 180)) return refuse('bad-angle');
  return quantity(distanceM * perMetre((Math.abs(errorDeg) * Math.PI) / 180));
}
