import type { Geographic } from './geographic';
import { gridFactors } from './grid-factors';
import type { GridFactors } from './grid-factors';
import { openProjection } from './open-projection';
import type { GridPlace, OutsideRefusal, Projection } from './open-projection';
import { refuse } from './refusal';
import type { Refused } from './refusal';
import { utmZone } from './utm-zone';
import type { UtmZone } from './utm-zone';

export type UtmPlace = { readonly kind: 'utm'; readonly zone: number; readonly hemisphere: 'N' | 'S'; readonly factors: GridFactors } & GridPlace;

const opened = new Map<string, Projection>();

function projectionOf({ zone, hemisphere }: UtmZone): Projection {
  const text = zone === 0
    ? `+proj=stere +lat_0=${hemisphere === 'N' ? 90 : -90} +lon_0=0 +k=0.994 +x_0=2000000 +y_0=2000000 +datum=WGS84 +units=m`
    : `+proj=utm +zone=${zone}${hemisphere === 'S' ? ' +south' : ''} +datum=WGS84 +units=m`;
  const known = opened.get(text);
  if (known) return known;
  const projection = openProjection(text);
  if (projection.kind === 'refused') throw new Error(`automaticUtm: ${text} does not open (${projection.reason})`);
  opened.set(text, projection);
  return projection;
}

/**
 * A place in its own UTM zone (or the polar system), with grid convergence and scale.
 *
 * @param place degrees WGS 84
 * @returns zone 1-60 (0 = UPS), easting and northing in m, factors; refused close to a pole
 * @source NGA.SIG.0012 (2014); see `utmZone`
 * @example automaticUtm({ lat: 60.1699, lon: 24.9384 }) // 35 N, 385611.317, 6672118.380
 */
export function automaticUtm(place: Geographic): UtmPlace | Refused<OutsideRefusal> {
  const zone = utmZone(place);
  if (zone.kind === 'refused') return refuse('bad-place');
  const projection = projectionOf(zone);
  const grid = projection.toGrid(place);
  if (grid.kind === 'refused') return grid;
  const factors = gridFactors(projection, place);
  if (factors.kind === 'refused') return factors;
  return { kind: 'utm', zone: zone.zone, hemisphere: zone.hemisphere, easting: grid.easting, northing: grid.northing, factors };
}
