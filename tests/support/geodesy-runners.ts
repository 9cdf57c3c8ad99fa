import { automaticUtm } from '@/lib/position/automatic-utm';
import { shiftDatum } from '@/lib/position/datum-shift';
import type { HelmertParameters } from '@/lib/position/datum-shift';
import { findEllipsoid } from '@/lib/position/ellipsoids';
import { formatMgrs } from '@/lib/position/format-mgrs';
import { geodesicBetween, geodesicFrom } from '@/lib/position/geodesic';
import { openProjection } from '@/lib/position/open-projection';
import { polygonArea } from '@/lib/position/polygon-area';
import type { Difference } from './compare-reference';
import { compareReference } from './compare-reference';
import { given } from './given';

type Place = { readonly lat: number; readonly lon: number };
export type Reference = { readonly kind: string; readonly tolerance: Parameters<typeof compareReference>[2] };
type Cases<In> = Reference & { readonly inputs: { readonly cases: readonly In[] }; readonly expected: unknown };

function projection({ inputs, expected, tolerance }: Cases<Place & { proj: string; inv_easting: number; inv_northing: number }>) {
  const cases = inputs.cases.map((c) => {
    const opened = given(openProjection(c.proj));
    const grid = given(opened.toGrid({ lat: c.lat, lon: c.lon }));
    const back = given(opened.toGeographic({ easting: c.inv_easting, northing: c.inv_northing }));
    return { easting: grid.easting, northing: grid.northing, inv_lon: back.lon, inv_lat: back.lat };
  });
  return compareReference(expected, { cases }, tolerance);
}

function datumShift({ inputs, expected, tolerance }: Cases<Place & { source_ellps: string; target_ellps: string; helmert: HelmertParameters }>) {
  const cases = inputs.cases.map((c) => shiftDatum({ lat: c.lat, lon: c.lon }, c.helmert, findEllipsoid(c.source_ellps)!, findEllipsoid(c.target_ellps)!));
  return compareReference(expected, { cases }, tolerance);
}

function utmAuto({ inputs, expected, tolerance }: Cases<Place>) {
  const cases = inputs.cases.map((c) => {
    const utm = given(automaticUtm(c));
    return {
      zone: utm.zone, hemisphere: utm.hemisphere, easting: utm.easting, northing: utm.northing,
      convergence_deg: utm.factors.convergenceDeg, scale: utm.factors.scale, mgrs_1m: formatMgrs(utm, c.lat, 5), mgrs_1km: formatMgrs(utm, c.lat, 2),
    };
  });
  return compareReference(expected, { cases }, tolerance);
}

function geodesic({ inputs, expected, tolerance }: Reference & {
  readonly inputs: Readonly<Record<'lat1' | 'lon1' | 'lat2' | 'lon2' | 'direct_azi1' | 'direct_s12', readonly number[]>> & { readonly check_azimuth: readonly boolean[] };
  readonly expected: { readonly inverse: Record<'s12' | 'azi1' | 'azi2', readonly number[]>; readonly direct: unknown };
}) {
  const from = inputs.lat1.map((lat, i) => ({ lat, lon: inputs.lon1[i]! }));
  const lines = from.map((place, i) => given(geodesicBetween(place, { lat: inputs.lat2[i]!, lon: inputs.lon2[i]! })));
  const ends = from.map((place, i) => given(geodesicFrom(place, inputs.direct_azi1[i]!, inputs.direct_s12[i]!)));
  // Where the azimuth is not unique, the reference value stands in for ours.
  const azimuth = (key: 'azi1' | 'azi2', ours: readonly number[]) => ours.map((value, i) => (inputs.check_azimuth[i] ? value : expected.inverse[key][i]!));
  return compareReference(expected, {
    inverse: { s12: lines.map((l) => l.distanceM), azi1: azimuth('azi1', lines.map((l) => l.azimuthDeg)), azi2: azimuth('azi2', lines.map((l) => l.onwardAzimuthDeg)) },
    direct: { lat2: ends.map((e) => e.lat), lon2: ends.map((e) => e.lon), azi2: ends.map((e) => e.onwardAzimuthDeg) },
  }, tolerance);
}

function polygons({ inputs, expected, tolerance }: Reference & { readonly expected: unknown; readonly inputs: { readonly polygons: readonly { readonly lat: readonly number[]; readonly lon: readonly number[] }[] } }) {
  const ours = inputs.polygons.map(({ lat, lon }) => {
    const area = given(polygonArea(lat.map((value, i) => ({ lat: value, lon: lon[i]! }))));
    return { n: area.n, perimeter: area.perimeterM, area_signed: area.signedM2, area_ha: area.areaHa };
  });
  return compareReference(expected, { polygons: ours }, tolerance);
}

/** Runs a reference file of geodesy by its `kind`; gives what differs by more than the file's tolerance. */
export const geodesyRunners: Readonly<Record<string, (file: never) => readonly Difference[]>> = {
  projection, datum_shift: datumShift, utm_auto: utmAuto, geodesic, polygon_area: polygons,
};
