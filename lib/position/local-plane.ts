import type { Geographic } from './geographic';
import { geodesicBetween, geodesicFrom } from './geodesic';

/** A place in a plane that touches the ellipsoid at a pivot; m, north is up. */
export type PlanePoint = { readonly eastM: number; readonly northM: number };

/**
 * A place in the azimuthal equidistant plane round a pivot: distance and azimuth from the pivot are exact on WGS 84.
 *
 * Between two other points the plane stretches by less than 1e-6 within 15 km. Throws RangeError for a bad place.
 *
 * @source Snyder 1987, USGS Professional Paper 1395, azimuthal equidistant, by geodesics (Karney 2013)
 */
export function toPlane(pivot: Geographic, place: Geographic): PlanePoint {
  const line = geodesicBetween(pivot, place);
  if (line.kind === 'refused') throw new RangeError('toPlane: not a place');
  const azimuth = (line.azimuthDeg * Math.PI) / 180;
  return { eastM: line.distanceM * Math.sin(azimuth), northM: line.distanceM * Math.cos(azimuth) };
}

/** The place on WGS 84 of a point in the plane round a pivot; undoes `toPlane`. Throws RangeError for a bad pivot. */
export function fromPlane(pivot: Geographic, point: PlanePoint): Geographic {
  const end = geodesicFrom(pivot, (Math.atan2(point.eastM, point.northM) * 180) / Math.PI, Math.hypot(point.eastM, point.northM));
  if (end.kind === 'refused') throw new RangeError('fromPlane: not a place');
  return { lat: end.lat, lon: end.lon };
}
