import geographiclib from 'geographiclib-geodesic';
import type { Geographic } from './geographic';
import { isGeographic } from './geographic';
import { refuse } from './refusal';
import type { Refused } from './refusal';

const wgs84 = geographiclib.Geodesic.WGS84;

export type GeodesicLine = {
  readonly kind: 'line';
  readonly distanceM: number;
  /** Azimuths at both ends, clockwise from true north, in [-180, 180]; the second is the direction onwards. */
  readonly azimuthDeg: number;
  readonly onwardAzimuthDeg: number;
};

/**
 * Distance and azimuths of the shortest line between two places on WGS 84.
 *
 * Converges everywhere, nearly antipodal places included (Vincenty's method does not); error below 1e-8 m.
 * At a pole and between antipodes the azimuth is one of many.
 *
 * @param from degrees WGS 84
 * @param to degrees WGS 84
 * @returns m and degrees; `bad-place` for numbers that are no place
 * @source Karney 2013, Algorithms for geodesics, Journal of Geodesy 87:43-55 (geographiclib-geodesic)
 * @example geodesicBetween({ lat: 45, lon: 9.5 }, { lat: 45.0001, lon: 9.5001 }) // 13.626109 m
 */
export function geodesicBetween(from: Geographic, to: Geographic): GeodesicLine | Refused<'bad-place'> {
  if (!isGeographic(from) || !isGeographic(to)) return refuse('bad-place');
  const line = wgs84.Inverse(from.lat, from.lon, to.lat, to.lon);
  return { kind: 'line', distanceM: line.s12!, azimuthDeg: line.azi1!, onwardAzimuthDeg: line.azi2! };
}

/**
 * The place reached by going a distance in a direction on WGS 84.
 *
 * @param from degrees WGS 84
 * @param azimuthDeg clockwise from true north
 * @param distanceM along the geodesic, m; negative goes backwards
 * @returns the place and the direction onwards; refused for numbers that are no place or not finite
 * @source Karney 2013 (as above)
 * @example geodesicFrom({ lat: 44.5646, lon: -123.262 }, 30, 10) // 44.56467793, -123.26193707
 */
export function geodesicFrom(from: Geographic, azimuthDeg: number, distanceM: number): ({ readonly kind: 'place'; readonly onwardAzimuthDeg: number } & Geographic) | Refused<'bad-place' | 'bad-line'> {
  if (!isGeographic(from)) return refuse('bad-place');
  if (!Number.isFinite(azimuthDeg) || !Number.isFinite(distanceM)) return refuse('bad-line');
  const end = wgs84.Direct(from.lat, from.lon, azimuthDeg, distanceM);
  return { kind: 'place', lat: end.lat2!, lon: end.lon2!, onwardAzimuthDeg: end.azi2! };
}
