import { findCrs } from './crs-definitions';
import type { CrsDefinition } from './crs-definitions';
import { shiftDatum } from './datum-shift';
import { findEllipsoid } from './ellipsoids';
import type { Geographic } from './geographic';
import { isGeographic } from './geographic';
import { openProjection } from './open-projection';
import type { GridPlace, OutsideRefusal, Projection } from './open-projection';
import type { ProjectionRefusal } from './parse-projection';
import { refuse } from './refusal';
import type { Refused } from './refusal';

export type ProjectGrid = {
  readonly kind: 'project-grid';
  readonly crs: CrsDefinition;
  /** Metres per unit of the grid. */
  readonly unitM: number;
  readonly projection: Projection;
  /** From WGS 84, as a phone gives it, into the project's grid; the datum shift included. */
  readonly fromWgs84: (place: Geographic) => ({ readonly kind: 'grid' } & GridPlace) | Refused<OutsideRefusal>;
  readonly toWgs84: (place: GridPlace) => ({ readonly kind: 'geographic' } & Geographic) | Refused<OutsideRefusal>;
};

const wgs84 = findEllipsoid('WGS84')!;

/**
 * Opens the grid of a project, so that positions from a phone (WGS 84) can be shown in it and planned ones read from it.
 *
 * @param setting EPSG code that ships, or a proj string; one on an old ellipsoid must carry `+towgs84`
 * @returns both directions, or why the setting cannot be used
 * @source see `findCrs`, `shiftDatum`, `openProjection`
 * @example openProjectGrid('EPSG:27700')
 */
export function openProjectGrid(setting: string): ProjectGrid | Refused<'unknown-code' | 'needs-grid-file' | ProjectionRefusal> {
  const crs = findCrs(setting);
  if (crs.kind === 'refused') return crs;
  const projection = openProjection(crs.proj);
  if (projection.kind === 'refused') return projection;
  const { toWgs84: shift, ellipsoid, unitM } = projection.parsed;
  if (shift === 'grid-file') return refuse('needs-grid-file');
  if (shift === 'unknown') return refuse('unknown-datum');
  return {
    kind: 'project-grid', crs, unitM, projection,
    fromWgs84: (place) => {
      if (!isGeographic(place)) return refuse('bad-place');
      return projection.toGrid(shift === 'same' ? place : shiftDatum(place, shift, wgs84, ellipsoid, 'backwards'));
    },
    toWgs84: (place) => {
      const own = projection.toGeographic(place);
      if (own.kind === 'refused' || shift === 'same') return own;
      return { kind: 'geographic', ...shiftDatum(own, shift, ellipsoid, wgs84) };
    },
  };
}
