import { plotArea } from './plot-radius';
import { refuse } from './refusal';
import type { Refused } from './refusal';

/** One circle of a nested plot: stems from `fromDbhCm` on are tallied on it, up to the next circle's start. */
export type NestedCircle = { readonly fromDbhCm: number; readonly radiusM: number };
export type NestedRefusal = 'no-circles' | 'bad-circle' | 'circle-not-larger' | 'bad-dbh' | 'below-threshold';
export type CircleOfStem = {
  readonly kind: 'circle'; readonly index: number; readonly radiusM: number;
  /** Trees per ha, from the radius laid out. */
  readonly expansionPerHa: number;
};

/**
 * The one circle on which a stem is tallied, with its expansion factor.
 *
 * Each DBH class has one circle, the largest that the stem is thick enough for, and it counts on the whole of that
 * circle, the inner part included; never on two. So the factor does not depend on where in the plot the stem stands.
 *
 * @param circles in any order, larger ones for thicker stems; radii in m, DBH in cm
 * @param dbhCm as used for the class (rounded by the project's rule beforehand), above 0
 * @returns the circle (`index` in the list given); `below-threshold` when the stem is too thin for all of them
 * @source common practice, no source
 * @example circleOfStem([{ fromDbhCm: 5, radiusM: 3.99 }, { fromDbhCm: 15, radiusM: 11.28 }], 9) // 3.99 m, 199.94 per ha
 */
export function circleOfStem(circles: readonly NestedCircle[], dbhCm: number): CircleOfStem | Refused<NestedRefusal> {
  if (circles.length === 0) return refuse('no-circles');
  if (circles.some((c) => !(c.fromDbhCm >= 0 && Number.isFinite(c.fromDbhCm) && c.radiusM > 0 && Number.isFinite(c.radiusM)))) return refuse('bad-circle');
  const sorted = circles.map((circle, index) => ({ ...circle, index })).sort((a, b) => a.fromDbhCm - b.fromDbhCm);
  // A design whose thicker class has the smaller circle, or which starts two classes at one DBH, is not nested.
  const nested = sorted.every((c, i) => i === 0 || (c.fromDbhCm > sorted[i - 1]!.fromDbhCm && c.radiusM > sorted[i - 1]!.radiusM));
  if (!nested) return refuse('circle-not-larger');
  if (!(Number.isFinite(dbhCm) && dbhCm > 0)) return refuse('bad-dbh');
  const circle = sorted.findLast((c) => dbhCm >= c.fromDbhCm);
  if (circle === undefined) return refuse('below-threshold');
  const area = plotArea(circle.radiusM, 'metric');
  if (area.kind === 'refused') return refuse('bad-circle');
  return { kind: 'circle', index: circle.index, radiusM: circle.radiusM, expansionPerHa: 10_000 / area.value };
}
