import type { HelmertParameters } from './datum-shift';
import { findEllipsoid } from './ellipsoids';
import type { Ellipsoid } from './ellipsoids';
import { refuse } from './refusal';
import type { Refused } from './refusal';

export type ParsedProjection = {
  readonly kind: 'projection';
  /** The projection's PROJ name, such as `tmerc`. */
  readonly method: string;
  /** For proj4: the projection alone, its ellipsoid spelled out, without any datum. */
  readonly projection: string;
  /** For proj4: longitude and latitude on the same ellipsoid and prime meridian. */
  readonly geographic: string;
  readonly ellipsoid: Ellipsoid;
  /** Metres per unit of the grid. */
  readonly unitM: number;
  /**
   * From the grid's datum to WGS 84; `same` when the two agree within what a phone can tell, `grid-file` when only a
   * file of shifts that is not here would do, `unknown` when the string does not say.
   */
  readonly toWgs84: HelmertParameters | 'same' | 'grid-file' | 'unknown';
};
export type ProjectionRefusal = 'not-a-proj-string' | 'unknown-ellipsoid' | 'unknown-datum' | 'unknown-unit' | 'bad-parameter' | 'unknown-projection';

type Shift = ParsedProjection['toWgs84'];

/**
 * Datums named in proj strings: the ellipsoid of each, and its shift. NAD83 equals WGS 84 to about 1-2 m (EPSG:1188);
 * OSGB36 by EPSG:1314, Potsdam by EPSG:1777. The others have several shifts, of which the string must choose one.
 */
const datums: Readonly<Record<string, readonly [ellipsoid: string, shift: Shift]>> = {
  WGS84: ['WGS84', 'same'], NAD83: ['GRS80', 'same'], NAD27: ['clrk66', 'grid-file'],
  OSGB36: ['airy', { x: 446.448, y: -125.157, z: 542.06, rx: 0.15, ry: 0.247, rz: 0.842, s: -20.489, convention: 'position_vector' }],
  potsdam: ['bessel', { x: 598.1, y: 73.7, z: 418.2, rx: 0.202, ry: 0.045, rz: -2.455, s: 6.7, convention: 'position_vector' }],
  hermannskogel: ['bessel', 'unknown'], carthage: ['clrk80ign', 'unknown'], ire65: ['mod_airy', 'unknown'], nzgd49: ['intl', 'unknown'],
  GGRS87: ['GRS80', 'unknown'],
};
/** Exact: international foot; US survey foot, 1200/3937 m (US Federal Register 2020-21902). */
const units: Readonly<Record<string, number>> = { m: 1, km: 1000, ft: 0.3048, 'us-ft': 1200 / 3937 };
const dropped = new Set(['datum', 'ellps', 'a', 'b', 'rf', 'f', 'R', 'towgs84', 'nadgrids', 'wktext', 'no_defs', 'type', 'axis']);

function readPairs(text: string): Map<string, string> {
  return new Map(text.trim().split(/\s+/).map((part) => {
    const [key = '', value = ''] = part.replace(/^\+/, '').split('=');
    return [key, value] as const;
  }));
}

function readEllipsoid(pairs: ReadonlyMap<string, string>): Ellipsoid | Refused<ProjectionRefusal> {
  const number = (key: string): number | null => (pairs.has(key) ? Number(pairs.get(key)) : null);
  const a = number('a') ?? number('R');
  if (a !== null) {
    const b = number('b'), f = number('f');
    const inverseFlattening = number('rf') ?? (b !== null && b !== a ? a / (a - b) : f ? 1 / f : Infinity);
    return a > 0 && !Number.isNaN(inverseFlattening) ? { a, inverseFlattening } : refuse('bad-parameter');
  }
  const datum = pairs.get('datum');
  if (datum !== undefined && !Object.hasOwn(datums, datum)) return refuse('unknown-datum');
  return findEllipsoid(pairs.get('ellps') ?? (datum === undefined ? 'GRS80' : datums[datum]![0])) ?? refuse('unknown-ellipsoid');
}

function readShift(pairs: ReadonlyMap<string, string>, ellipsoid: Ellipsoid): Shift | Refused<ProjectionRefusal> {
  const text = pairs.get('towgs84');
  const modern = ellipsoid.a === 6378137 && Math.abs(ellipsoid.inverseFlattening - 298.2572) < 1e-3;
  if (text !== undefined) {
    const values = text.split(',').map(Number);
    if ((values.length !== 3 && values.length !== 7) || values.some((v) => !Number.isFinite(v))) return refuse('bad-parameter');
    const [x = 0, y = 0, z = 0, rx = 0, ry = 0, rz = 0, s = 0] = values;
    return modern && values.every((v) => v === 0) ? 'same' : { x, y, z, rx, ry, rz, s, convention: 'position_vector' };
  }
  const grids = pairs.get('nadgrids');
  if (grids !== undefined) return grids === '@null' ? 'same' : 'grid-file';
  const datum = pairs.get('datum');
  if (datum !== undefined) return datums[datum]![1];
  // An old ellipsoid without a shift would be off by 50 to 200 m if it were taken for WGS 84.
  return modern ? 'same' : 'unknown';
}

/**
 * Reads a proj string and takes it apart into the projection, its ellipsoid and its datum shift.
 *
 * The datum is taken out because a projection starts from its own geographic system; the shift is a step of its own.
 * Missing false eastings are 0, as in PROJ. Without ellipsoid or datum the ellipsoid is GRS80, PROJ's default.
 *
 * @param text such as `+proj=utm +zone=33 +datum=WGS84 +units=m`
 * @returns the parts, or why the string cannot be used
 * @source PROJ documentation, "Cartographic projection" (parameters and defaults)
 * @example parseProjection('+proj=utm +zone=33 +datum=WGS84')
 */
export function parseProjection(text: string): ParsedProjection | Refused<ProjectionRefusal> {
  if (text.length > 500 || !/^\s*\+proj=[a-z0-9_]+(\s+\+[A-Za-z0-9_]+(=[-+@A-Za-z0-9_.,]+)?)*\s*$/.test(text)) return refuse('not-a-proj-string');
  const pairs = readPairs(text);
  const name = pairs.get('proj')!;
  if (name === 'longlat' || name === 'latlong') return refuse('unknown-projection');
  const ellipsoid = readEllipsoid(pairs);
  if ('kind' in ellipsoid) return ellipsoid;
  const toWgs84 = readShift(pairs, ellipsoid);
  if (typeof toWgs84 === 'object' && 'kind' in toWgs84) return toWgs84;
  const unit = pairs.get('units') ?? 'm';
  const unitM = pairs.has('to_meter') ? Number(pairs.get('to_meter')) : Object.hasOwn(units, unit) ? units[unit]! : NaN;
  if (!(unitM > 0)) return refuse('unknown-unit');
  const shape = Number.isFinite(ellipsoid.inverseFlattening) ? `+a=${ellipsoid.a} +rf=${ellipsoid.inverseFlattening}` : `+a=${ellipsoid.a} +b=${ellipsoid.a}`;
  const offsets = ['x_0', 'y_0'].filter((key) => !pairs.has(key)).map((key) => `+${key}=0`);
  const kept = [...pairs].filter(([key]) => !dropped.has(key)).map(([key, value]) => (value === '' ? `+${key}` : `+${key}=${value}`));
  const meridian = pairs.has('pm') ? ` +pm=${pairs.get('pm')}` : '';
  return {
    kind: 'projection', method: name, ellipsoid, unitM, toWgs84,
    // utm brings its own false origin, which offsets of 0 would not disturb in PROJ but need not be said.
    projection: [...kept, ...(name === 'utm' ? [] : offsets), shape].join(' '),
    geographic: `+proj=longlat ${shape}${meridian}`,
  };
}
