import { eccentricitySquared } from './ellipsoids';
import type { Ellipsoid } from './ellipsoids';
import type { Geographic } from './geographic';

/** Seven parameters: translations in m, rotations in arc-seconds, scale in parts per million. */
export type HelmertParameters = {
  readonly x: number; readonly y: number; readonly z: number;
  readonly rx: number; readonly ry: number; readonly rz: number; readonly s: number;
  /** Sign of the rotations. `none` is for three parameters, where it does not matter. */
  readonly convention: 'position_vector' | 'coordinate_frame' | 'none';
};

type Cartesian = readonly [number, number, number];
const radiansPerDegree = Math.PI / 180;

function toCartesian({ lat, lon }: Geographic, ellipsoid: Ellipsoid): Cartesian {
  const e2 = eccentricitySquared(ellipsoid);
  const phi = lat * radiansPerDegree, lambda = lon * radiansPerDegree;
  const normal = ellipsoid.a / Math.sqrt(1 - e2 * Math.sin(phi) ** 2);
  return [normal * Math.cos(phi) * Math.cos(lambda), normal * Math.cos(phi) * Math.sin(lambda), normal * (1 - e2) * Math.sin(phi)];
}

/** Fixed-point iteration on the latitude: near the surface each round gains more than two digits. */
function toGeographic([x, y, z]: Cartesian, ellipsoid: Ellipsoid): Geographic {
  const e2 = eccentricitySquared(ellipsoid);
  const p = Math.hypot(x, y);
  let phi = Math.atan2(z, p * (1 - e2));
  for (let i = 0; i < 12; i += 1) {
    const normal = ellipsoid.a / Math.sqrt(1 - e2 * Math.sin(phi) ** 2);
    phi = Math.atan2(z + e2 * normal * Math.sin(phi), p);
  }
  return { lat: phi / radiansPerDegree, lon: Math.atan2(y, x) / radiansPerDegree };
}

function rotationMatrix(parameters: HelmertParameters): readonly [Cartesian, Cartesian, Cartesian] {
  const sign = parameters.convention === 'coordinate_frame' ? -1 : 1;
  const [rx, ry, rz] = [parameters.rx, parameters.ry, parameters.rz].map((r) => (sign * r * radiansPerDegree) / 3600) as [number, number, number];
  const k = 1 + parameters.s * 1e-6;
  return [[k, -k * rz, k * ry], [k * rz, k, -k * rx], [-k * ry, k * rx, k]];
}

/** Solves M·v = w by Cramer's rule; M is the unit matrix up to 1e-4, so it is as well conditioned as can be. */
function solve([a, b, c]: readonly [Cartesian, Cartesian, Cartesian], w: Cartesian): Cartesian {
  const det = (p: Cartesian, q: Cartesian, r: Cartesian): number =>
    p[0] * (q[1] * r[2] - q[2] * r[1]) - p[1] * (q[0] * r[2] - q[2] * r[0]) + p[2] * (q[0] * r[1] - q[1] * r[0]);
  const d = det(a, b, c);
  const column = (j: 0 | 1 | 2): number => {
    const put = (row: Cartesian, value: number): Cartesian => [j === 0 ? value : row[0], j === 1 ? value : row[1], j === 2 ? value : row[2]];
    return det(put(a, w[0]), put(b, w[1]), put(c, w[2])) / d;
  };
  return [column(0), column(1), column(2)];
}

/**
 * Moves a place from one datum to another by a Helmert shift of its geocentric coordinates.
 *
 * Assumes that the place lies on the source ellipsoid (height 0) and drops the height it gets on the target. Rotations
 * are linearised, as in the EPSG methods 9603, 9606 and 9607. `backwards` undoes the shift exactly, up to that height.
 * A shift of seven parameters fits a national network to some metres only: `CrsDefinition.datumAccuracyM` says how well.
 *
 * @param place degrees on the source datum
 * @param parameters of the operation from source to target; with `backwards`, from target to source
 * @returns degrees on the target datum
 * @source IOGP Publication 373-7-2 (EPSG Guidance Note 7-2), Helmert transformations
 * @example shiftDatum({ lat: 51.5085, lon: -0.1257 }, osgb36ToWgs84, airy, wgs84) // 51.5090102264, -0.1273065856
 */
export function shiftDatum(place: Geographic, parameters: HelmertParameters, source: Ellipsoid, target: Ellipsoid, direction: 'forwards' | 'backwards' = 'forwards'): Geographic {
  const [x, y, z] = toCartesian(place, source);
  const rows = rotationMatrix(parameters);
  if (direction === 'backwards') return toGeographic(solve(rows, [x - parameters.x, y - parameters.y, z - parameters.z]), target);
  const turn = (row: Cartesian): number => row[0] * x + row[1] * y + row[2] * z;
  return toGeographic([turn(rows[0]) + parameters.x, turn(rows[1]) + parameters.y, turn(rows[2]) + parameters.z], target);
}
