import type { Geographic } from './geographic';
import { isGeographic } from './geographic';
import { refuse } from './refusal';
import type { Refused } from './refusal';

export type UtmZone = { readonly kind: 'zone'; /** 1 to 60; 0 is the polar system (UPS). */ readonly zone: number; readonly hemisphere: 'N' | 'S' };

/**
 * The standard UTM zone of a place, with the exceptions of south-west Norway and Svalbard.
 *
 * Zone 0 stands for the polar system, used from 84 degrees north and south of 80 degrees south. The equator is north.
 *
 * @param place degrees WGS 84
 * @returns zone and hemisphere; `bad-place` for numbers that are no place
 * @source NGA.SIG.0012 (2014), Universal Grids and the Transverse Mercator and Polar Stereographic Map Projections
 * @example utmZone({ lat: 60.3913, lon: 5.3221 }) // zone 32 N
 */
export function utmZone(place: Geographic): UtmZone | Refused<'bad-place'> {
  if (!isGeographic(place)) return refuse('bad-place');
  const { lat } = place;
  const lon = place.lon === 180 ? -180 : place.lon;
  const hemisphere = lat >= 0 ? 'N' : 'S';
  if (lat >= 84 || lat < -80) return { kind: 'zone', zone: 0, hemisphere };
  let zone = Math.floor((lon + 180) / 6) + 1;
  if (lat >= 56 && lat < 64 && zone === 31 && lon >= 3) zone = 32;
  if (lat >= 72 && lon >= 0 && lon < 42) zone = 2 * Math.floor((lon + 183) / 12) + 1;
  return { kind: 'zone', zone, hemisphere };
}
