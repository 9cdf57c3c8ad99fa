import { eccentricitySquared } from './ellipsoids';
import type { Ellipsoid } from './ellipsoids';

/**
 * The latitude that the published reverse formula of Lambert's azimuthal equal-area projection gives.
 *
 * The registry defines the way back by a series in the authalic latitude, cut after e^6, and other software follows it.
 * It differs from the exact inverse by up to 1.4e-8 degree (1.6 mm), by latitude. Coordinates handed on must agree
 * with everyone else's, so the published value is given; going to the grid and back misses by that much.
 *
 * @param lat exact inverse, degrees
 * @param ellipsoid of the projection
 * @returns degrees
 * @source IOGP Publication 373-7-2 (EPSG Guidance Note 7-2), method 9820; authalic latitude: Snyder 1987, eq. 3-11, 3-12, 3-18
 * @example publishedLaeaLatitude(48.13509999592, grs80) // 48.13509999230
 */
export function publishedLaeaLatitude(lat: number, ellipsoid: Ellipsoid): number {
  const e2 = eccentricitySquared(ellipsoid);
  if (e2 === 0) return lat;
  const e = Math.sqrt(e2);
  const radiansPerDegree = Math.PI / 180;
  const q = (sine: number): number => (1 - e2) * (sine / (1 - e2 * sine * sine) + Math.atanh(e * sine) / e);
  const beta = Math.asin(Math.max(-1, Math.min(1, q(Math.sin(lat * radiansPerDegree)) / q(1))));
  const second = e2 / 3 + (31 * e2 ** 2) / 180 + (517 * e2 ** 3) / 5040;
  const fourth = (23 * e2 ** 2) / 360 + (251 * e2 ** 3) / 3780;
  const sixth = (761 * e2 ** 3) / 45360;
  return (beta + second * Math.sin(2 * beta) + fourth * Math.sin(4 * beta) + sixth * Math.sin(6 * beta)) / radiansPerDegree;
}
