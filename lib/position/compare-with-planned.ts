import type { Geographic } from './geographic';
import { geodesicBetween } from './geodesic';
import type { ProjectGrid } from './open-project-grid';
import type { OutsideRefusal } from './open-projection';
import type { Refused } from './refusal';

/** Where a person or a measured centre stands from the planned one, both ways of reckoning. */
export type PlannedComparison = {
  readonly kind: 'comparison';
  /** On the ellipsoid: the way on the ground at sea level. */
  readonly distanceM: number;
  /** To the planned centre, clockwise from true north, [0, 360). */
  readonly trueBearingDeg: number;
  /** In the project's grid, in m whatever the grid's unit. */
  readonly gridDistanceM: number;
  /** To the planned centre, clockwise from grid north, [0, 360). */
  readonly gridBearingDeg: number;
  /** `far` only when the distance exceeds the position's own 95 % radius (plus what the project allows). */
  readonly verdict: 'far' | 'not-shown-far';
};

const compass = (degrees: number): number => ((degrees % 360) + 360) % 360;

/**
 * Distance and bearing from a measured place to the planned centre, and whether it is far from it.
 *
 * The grid values are what a map of the project shows; they differ from the ground by the grid's scale (up to 0.04 % in
 * a UTM zone) and convergence (degrees). Bearings between the same two points are 0.
 *
 * @param measured with its 95 % radius, m
 * @param planned degrees WGS 84
 * @param grid the project's, from `openProjectGrid`
 * @param allowedM how far from the plan the project lets a plot stand, m
 * @returns both distances and bearings; refused for a bad place or one outside the grid
 * @source geodesic: Karney 2013; grid: plane trigonometry
 * @example compareWithPlanned({ lat: 47, lon: 8, r95M: 12 }, { lat: 47.0002, lon: 8 }, grid, 0) // far: 22 m > 12 m
 */
export function compareWithPlanned(measured: Geographic & { readonly r95M: number }, planned: Geographic, grid: ProjectGrid, allowedM: number): PlannedComparison | Refused<OutsideRefusal> {
  const line = geodesicBetween(measured, planned);
  if (line.kind === 'refused') return line;
  const here = grid.fromWgs84(measured);
  if (here.kind === 'refused') return here;
  const there = grid.fromWgs84(planned);
  if (there.kind === 'refused') return there;
  const east = (there.easting - here.easting) * grid.unitM, north = (there.northing - here.northing) * grid.unitM;
  return {
    kind: 'comparison', distanceM: line.distanceM, trueBearingDeg: compass(line.azimuthDeg),
    gridDistanceM: Math.hypot(east, north), gridBearingDeg: compass((Math.atan2(east, north) * 180) / Math.PI),
    verdict: line.distanceM > measured.r95M + allowedM ? 'far' : 'not-shown-far',
  };
}
