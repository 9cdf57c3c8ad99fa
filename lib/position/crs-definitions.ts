import { refuse } from './refusal';
import type { Refused } from './refusal';

/** A coordinate reference system that a project can lock. */
export type CrsDefinition = {
  readonly kind: 'crs';
  /** `EPSG:32633`, or `custom`. */
  readonly code: string;
  readonly name: string;
  readonly proj: string;
  /** How well its datum shift from WGS 84 is known, m; null when it is the project's own and unknown. */
  readonly datumAccuracyM: number | null;
};

const twoDigits = (zone: number): string => String(zone).padStart(2, '0');

function utm(zone: number, hemisphere: 'N' | 'S'): CrsDefinition {
  return {
    kind: 'crs', code: `EPSG:${hemisphere === 'N' ? 326 : 327}${twoDigits(zone)}`, name: `WGS 84 / UTM zone ${zone}${hemisphere}`,
    proj: `+proj=utm +zone=${zone}${hemisphere === 'S' ? ' +south' : ''} +datum=WGS84 +units=m`, datumAccuracyM: 0,
  };
}

/**
 * EPSG:27700 with EPSG:1314 (OSGB36 to WGS 84 (6)), which the registry rates at 2 m; Ordnance Survey's own shift by
 * grid file reaches 0.1 m and is not on the phone. Airy by its inverse flattening, see `ellipsoids`.
 */
const britishNationalGrid: CrsDefinition = {
  kind: 'crs', code: 'EPSG:27700', name: 'OSGB36 / British National Grid',
  proj: '+proj=tmerc +lat_0=49 +lon_0=-2 +k=0.9996012717 +x_0=400000 +y_0=-100000 +a=6377563.396 +rf=299.3249646 '
    + '+towgs84=446.448,-125.157,542.06,0.15,0.247,0.842,-20.489 +units=m',
  datumAccuracyM: 2,
};

/** All systems that ship, for a list to choose from: 120 UTM zones and the British National Grid. */
export const shippedCrs: readonly CrsDefinition[] = [
  ...(['N', 'S'] as const).flatMap((hemisphere) => Array.from({ length: 60 }, (_, i) => utm(i + 1, hemisphere))),
  britishNationalGrid,
];

/**
 * The system that a project's setting names.
 *
 * @param setting an EPSG code that ships (`EPSG:32633`), or a proj string of the project's own (starts with `+proj=`)
 * @returns the definition, or `unknown-code`; a custom string is checked when it is opened
 * @source EPSG registry (definitions of the codes)
 * @example findCrs('EPSG:32633') // WGS 84 / UTM zone 33N
 */
export function findCrs(setting: string): CrsDefinition | Refused<'unknown-code'> {
  const text = setting.trim();
  if (text.startsWith('+proj=')) {
    const sameAsWgs84 = /\+datum=WGS84\b/.test(text);
    return { kind: 'crs', code: 'custom', name: 'custom', proj: text, datumAccuracyM: sameAsWgs84 ? 0 : null };
  }
  return shippedCrs.find((crs) => crs.code === text.toUpperCase()) ?? refuse('unknown-code');
}
