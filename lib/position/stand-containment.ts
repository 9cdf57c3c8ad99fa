import type { Geographic } from './geographic';
import { isGeographic } from './geographic';
import { toPlane } from './local-plane';
import type { PlanePoint } from './local-plane';
import { refuse } from './refusal';
import type { Refused } from './refusal';

/** One ring of corners, first not repeated at the end (a repeat does no harm); holes and further parts are rings too. */
export type Ring = readonly Geographic[];
export type StandContainment = {
  readonly kind: 'containment';
  readonly inside: boolean;
  /** To the nearest edge of any ring, m. */
  readonly distanceToEdgeM: number;
  /** `outside` only when the place lies outside by more than its own 95 % radius; `inside` likewise. */
  readonly verdict: 'inside' | 'outside' | 'not-shown';
};

/** Distance from the origin to the segment a-b. */
function distanceToSegment(a: PlanePoint, b: PlanePoint): number {
  const dE = b.eastM - a.eastM, dN = b.northM - a.northM;
  const length2 = dE * dE + dN * dN;
  const t = length2 > 0 ? Math.min(1, Math.max(0, -(a.eastM * dE + a.northM * dN) / length2)) : 0;
  return Math.hypot(a.eastM + t * dE, a.northM + t * dN);
}

/** Whether the ray from the origin to the east crosses the edge a-b; half-open, so a corner counts once. */
function crossesEast(a: PlanePoint, b: PlanePoint): boolean {
  if (a.northM > 0 === b.northM > 0) return false;
  return a.eastM - (a.northM * (b.eastM - a.eastM)) / (b.northM - a.northM) > 0;
}

/**
 * Whether a place lies in a stand, how far from its edge, and whether its precision lets one say so.
 *
 * Works in a plane round the place itself, so distances to the edge are exact to 1e-6 for stands within 15 km, anywhere
 * on earth, the 180th meridian included. Inside by the even-odd rule over all rings, so holes are outside.
 *
 * @param place degrees WGS 84, with its 95 % radius in m
 * @param rings each of three corners or more
 * @returns inside or not, distance to the nearest edge, verdict; refused for a bad place or ring
 * @source even-odd (crossing) rule; plane: `toPlane`
 * @example standContainment({ lat: 47, lon: 8, r95M: 10 }, [outline])
 */
export function standContainment(place: Geographic & { readonly r95M: number }, rings: readonly Ring[]): StandContainment | Refused<'bad-place' | 'no-outline'> {
  if (!isGeographic(place) || !rings.every((ring) => ring.every(isGeographic))) return refuse('bad-place');
  if (rings.length === 0 || rings.some((ring) => ring.length < 3)) return refuse('no-outline');
  let crossings = 0, distanceToEdgeM = Infinity;
  for (const ring of rings) {
    const corners = ring.map((corner) => toPlane(place, corner));
    corners.forEach((corner, i) => {
      const next = corners[(i + 1) % corners.length]!;
      if (crossesEast(corner, next)) crossings += 1;
      distanceToEdgeM = Math.min(distanceToEdgeM, distanceToSegment(corner, next));
    });
  }
  const inside = crossings % 2 === 1;
  const shown = distanceToEdgeM > place.r95M;
  return { kind: 'containment', inside, distanceToEdgeM, verdict: shown ? (inside ? 'inside' : 'outside') : 'not-shown' };
}
