import { refuse } from './refusal';
import type { Refused } from './refusal';

/** A straight edge of the tract as seen from the plot's centre: the nearest point of it, m and degrees. */
export type StraightBoundary = { readonly distanceM: number; readonly azimuthDeg: number };
export type TallyTimes = { readonly kind: 'tally'; readonly times: 1 | 2 };

/**
 * How often an in-tree is tallied by the walkthrough method: twice when going on through it, as far again as it stands
 * from the centre, ends outside the tract.
 *
 * Works for edges of any shape. Ending exactly on the edge is not outside. Slope counts only as horizontal distance.
 *
 * @param treeDistanceM horizontal, centre to tree, m, above 0
 * @param boundaryDistanceM horizontal, centre to edge along the ray through the tree, m; null when it meets none
 * @returns 1 or 2; `tree-outside` when the tree stands beyond the edge, where it is not tallied at all
 * @source Ducey, Gove and Valentine 2004, Forest Science 50(4):427-435
 * @example walkthroughTally(7, 10) // 2
 */
export function walkthroughTally(treeDistanceM: number, boundaryDistanceM: number | null): TallyTimes | Refused<'bad-distance' | 'tree-outside'> {
  if (!(Number.isFinite(treeDistanceM) && treeDistanceM > 0)) return refuse('bad-distance');
  if (boundaryDistanceM === null) return { kind: 'tally', times: 1 };
  if (!(Number.isFinite(boundaryDistanceM) && boundaryDistanceM >= 0)) return refuse('bad-distance');
  if (treeDistanceM > boundaryDistanceM) return refuse('tree-outside');
  return { kind: 'tally', times: 2 * treeDistanceM > boundaryDistanceM ? 2 : 1 };
}

/**
 * How often an in-tree is tallied by the mirage method: again when it stands in the circle round the centre reflected in
 * the edge.
 *
 * Right for one straight edge that runs on beyond the plot; at a corner or a crooked edge it is biased, so use the
 * walkthrough there. All distances horizontal.
 *
 * @param tree from the plot's centre: m and degrees
 * @param limitM the tree's own radius or limiting distance, m
 * @param boundary nearest point of the edge from the plot's centre
 * @returns 1 or 2; `tree-outside` beyond the edge, `not-in` when the tree is beyond its own limit
 * @source Gregoire 1982, The unbiasedness of the mirage correction procedure for boundary overlap, Forest Science 28(3):504-508
 * @example mirageTally({ distanceM: 5, azimuthDeg: 90 }, 11.28, { distanceM: 6, azimuthDeg: 90 }) // 2
 */
export function mirageTally(
  tree: { readonly distanceM: number; readonly azimuthDeg: number }, limitM: number, boundary: StraightBoundary,
): TallyTimes | Refused<'bad-distance' | 'not-in' | 'tree-outside'> {
  const lengths = [tree.distanceM, limitM, boundary.distanceM];
  if (!lengths.every((v) => Number.isFinite(v) && v >= 0) || !Number.isFinite(tree.azimuthDeg) || !Number.isFinite(boundary.azimuthDeg)) return refuse('bad-distance');
  if (tree.distanceM > limitM) return refuse('not-in');
  const turn = ((tree.azimuthDeg - boundary.azimuthDeg) * Math.PI) / 180;
  const towards = tree.distanceM * Math.cos(turn), aside = tree.distanceM * Math.sin(turn);
  if (towards > boundary.distanceM) return refuse('tree-outside');
  const fromReflected = Math.hypot(2 * boundary.distanceM - towards, aside);
  return { kind: 'tally', times: fromReflected <= limitM ? 2 : 1 };
}

export type CircleParts = { readonly kind: 'parts'; readonly insideM2: number; readonly outsideM2: number; readonly insideShare: number };

/**
 * Areas of a circular plot on both sides of a straight edge.
 *
 * @param radiusM of the plot, m, above 0
 * @param edgeDistanceM from the centre (inside) to the edge, m, at least 0; from the radius on nothing lies outside
 * @returns segment r² acos(d/r) - d sqrt(r² - d²) as outside, the rest as inside, m²
 * @source geometry of the circle
 * @example circleParts(11.283792, 6) // outside 71.27778 m², inside 328.72222 m²
 */
export function circleParts(radiusM: number, edgeDistanceM: number): CircleParts | Refused<'bad-distance'> {
  if (!(Number.isFinite(radiusM) && radiusM > 0 && Number.isFinite(edgeDistanceM) && edgeDistanceM >= 0)) return refuse('bad-distance');
  const d = Math.min(edgeDistanceM, radiusM);
  const whole = Math.PI * radiusM ** 2;
  const outsideM2 = radiusM ** 2 * Math.acos(d / radiusM) - d * Math.sqrt(Math.max(0, radiusM ** 2 - d ** 2));
  return { kind: 'parts', outsideM2, insideM2: whole - outsideM2, insideShare: 1 - outsideM2 / whole };
}
