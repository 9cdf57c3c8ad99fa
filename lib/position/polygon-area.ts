import geographiclib from 'geographiclib-geodesic';
import type { Geographic } from './geographic';
import { isGeographic } from './geographic';
import { refuse } from './refusal';
import type { Refused } from './refusal';

export type PolygonArea = {
  readonly kind: 'area'; readonly n: number; readonly perimeterM: number;
  /** m², positive when the corners run anticlockwise. */
  readonly signedM2: number;
  readonly areaHa: number;
};

/**
 * Perimeter and area of a polygon of geodesics on WGS 84; the last corner joins the first.
 *
 * Assumes that the outline does not cross itself (not checked) and does not go round a pole.
 *
 * @param corners at least three, degrees WGS 84, first corner not repeated
 * @returns m, m² and ha; refused for fewer than three corners or a bad one
 * @source Karney 2013, Journal of Geodesy 87:43-55, section 6 (geographiclib-geodesic)
 * @example polygonArea([{ lat: 44.5646, lon: -123.262 }, { lat: 44.5646, lon: -123.26074 }, { lat: 44.5655, lon: -123.26074 }, { lat: 44.5655, lon: -123.262 }]) // 1.001067256 ha
 */
export function polygonArea(corners: readonly Geographic[]): PolygonArea | Refused<'too-few-corners' | 'bad-place'> {
  if (corners.length < 3) return refuse('too-few-corners');
  if (!corners.every(isGeographic)) return refuse('bad-place');
  const polygon = geographiclib.Geodesic.WGS84.Polygon(false);
  for (const { lat, lon } of corners) polygon.AddPoint(lat, lon);
  const { number, perimeter, area } = polygon.Compute(false, true);
  return { kind: 'area', n: number, perimeterM: perimeter, signedM2: area!, areaHa: Math.abs(area!) / 10_000 };
}
