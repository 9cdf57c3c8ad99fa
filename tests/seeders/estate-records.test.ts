import proj4 from 'proj4';
import { describe, expect, it } from 'vitest';
import { entities, entitySchemas } from '@/lib/schema/entities';
import type { EntityName, EntityRecord } from '@/lib/schema/entities';
import type { RecordChange } from '@/lib/schema/record-change';
import { estateRecords } from '@/seeders/estate-records';
import { estateTruth } from '@/seeders/estate-truth';
import { tractRecords } from '@/seeders/tract-records';
import { peopleIds } from './people-ids';

const estate = estateRecords(peopleIds);
const tract = tractRecords();
const all: readonly RecordChange[] = [...estate.design, ...estate.visits.flatMap(({ changes }) => changes), ...tract.design];

function recordsOf<E extends EntityName>(changes: readonly RecordChange[], entity: E): EntityRecord[E][] {
  return changes.flatMap((change) => (change.entity === entity && change.kind === 'create' ? [change.values as EntityRecord[E]] : []));
}
const visitChanges = estate.visits.flatMap(({ changes }) => changes);
const measurements = recordsOf(visitChanges, 'stemMeasurement');

describe('records of the demo', () => {
  it('the same seed gives the same ids and values, another seed others', () => {
    expect(estateRecords(peopleIds)).toEqual(estate);
    expect(tractRecords()).toEqual(tract);
    expect(estateRecords(peopleIds, 'another')).not.toEqual(estate);
    expect(estateTruth().plots).toEqual(estateTruth().plots);
  });

  it('every record is what its schema parses, field by field, and only creations are made', () => {
    for (const change of all) {
      expect(change.kind).toBe('create');
      if (change.kind === 'create') expect(entitySchemas[change.entity].parse(change.values)).toEqual(change.values);
    }
  });

  it('ids are unique, and every parent stands before its child, in the same project', () => {
    const projectOf = new Map<string, string>();
    for (const change of all) {
      if (change.kind !== 'create') continue;
      const values = change.values as unknown as Record<string, string | null>;
      for (const field of Object.keys(entities[change.entity].parents)) {
        const parent = values[field];
        if (parent) expect(projectOf.get(parent), `${change.entity}.${field}`).toBe(values.projectId);
      }
      expect(projectOf.has(change.recordId)).toBe(false);
      projectOf.set(change.recordId, change.values.projectId);
    }
  });

  it('the estate has 60 plots in 4 strata, 5 species in 4 curve groups of which one is unknown, 400 m² circles', () => {
    const [project] = recordsOf(estate.design, 'project');
    expect(project).toMatchObject({ dbhUnit: 'cm', lengthUnit: 'm', areaUnit: 'ha', breastHeightM: 1.3, dbhDecimals: 1, heightDecimals: 1 });
    // A circle of 11.2838 m holds 400 m² (π r²) to a thousandth.
    expect(Math.abs(Math.PI * project!.plotDesign.radiusM ** 2 - 400)).toBeLessThan(0.01);
    const strata = recordsOf(estate.design, 'stratum');
    const plots = recordsOf(estate.design, 'plot');
    expect([strata.length, plots.length]).toEqual([4, 60]);
    expect(new Set(plots.map(({ number }) => number)).size).toBe(60);
    expect(new Set(plots.map(({ stratumId }) => stratumId))).toEqual(new Set(strata.map(({ id }) => id)));
    const species = recordsOf(estate.design, 'speciesEntry');
    expect(species).toHaveLength(5);
    expect(new Set(species.filter(({ unknown }) => !unknown).map(({ curveGroup }) => curveGroup)).size).toBe(3);
    expect(species.filter(({ unknown }) => unknown)).toHaveLength(1);
  });

  it('planned positions stand 280 m apart on the grid of the project’s coordinate system', () => {
    const [project] = recordsOf(estate.design, 'project');
    expect(project!.crs).toBe('EPSG:32633');
    const points = recordsOf(estate.design, 'plot').map(({ plannedLat, plannedLon }) =>
      proj4('WGS84', '+proj=utm +zone=33 +datum=WGS84 +units=m', [plannedLon!, plannedLat!]))
      .map(([easting = Number.NaN, northing = Number.NaN]) => ({ easting, northing }));
    const nearest = points.map((point) => Math.min(...points.filter((other) => other !== point)
      .map(({ easting, northing }) => Math.hypot(easting - point.easting, northing - point.northing))));
    for (const distance of nearest) expect(Math.abs(distance - 280)).toBeLessThan(0.05);
  });

  it('30 plots have one earlier visit, signed off, two or three years before autumn 2026; one of them has no trees', () => {
    const visits = recordsOf(visitChanges, 'visit');
    expect(visits).toHaveLength(30);
    expect(new Set(visits.map(({ plotId }) => plotId)).size).toBe(30);
    expect(new Set(visits.map(({ startedAt }) => startedAt.slice(0, 4)))).toEqual(new Set(['2023', '2024']));
    for (const visit of visits) expect(visit).toMatchObject({ kind: 'production', state: 'signedOff' });
    expect(visits.filter(({ outcome }) => outcome === 'no-trees')).toHaveLength(1);
    expect(visits.filter(({ outcome }) => outcome === 'full')).toHaveLength(29);
    for (const { finishedAt, startedAt } of visits) expect(Date.parse(finishedAt!)).toBeGreaterThan(Date.parse(startedAt));
    const withTrees = new Set(measurements.map(({ visitId }) => visitId));
    expect(visits.filter(({ id }) => withTrees.has(id)).every(({ outcome }) => outcome === 'full')).toBe(true);
  });

  it('every value used is the value of its reading, as typed with one decimal', () => {
    const readings = new Map(recordsOf(visitChanges, 'reading').map((reading) => [reading.id, reading]));
    expect(measurements.length).toBeGreaterThan(400);
    for (const measurement of measurements) {
      const dbh = readings.get(measurement.dbhReadingIds[0] ?? '');
      expect(dbh).toMatchObject({ measurementId: measurement.id, quantity: 'dbh', unit: 'cm', digits: measurement.dbhDigits, canonical: measurement.dbhCm });
      expect(measurement.dbhDigits).toMatch(/^\d+\.\d$/);
      expect(measurement.dbhCm).toBe(Number(measurement.dbhDigits));
      expect(measurement.dbhCm).toBeGreaterThanOrEqual(7);
      expect(measurement.heightReadingIds).toHaveLength(measurement.heightM === null ? 0 : 1);
      const height = readings.get(measurement.heightReadingIds[0] ?? '');
      expect(height?.canonical ?? null).toBe(measurement.heightM);
      if (measurement.form === 'broken' || measurement.form === 'leaning' || measurement.status === 'dead') expect(measurement.heightM).toBeNull();
    }
  });

  it('the diameters tallied are those of the truth within the error of the tape', () => {
    const truth = estateTruth().plots.flatMap((plot) => (plot.yearsSince === null ? [] : plot.trees.flatMap(({ stems }) => stems)))
      .flatMap(({ before }) => (before ? [before.dbhCm] : []));
    expect(measurements).toHaveLength(truth.length);
    const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);
    // Five standard errors of a mean of tape errors of 0.15 cm; rounding adds 0.03 cm (0.1/√12).
    const standardError = Math.hypot(0.15, 0.1 / Math.sqrt(12)) / Math.sqrt(truth.length);
    expect(Math.abs(sum(measurements.map(({ dbhCm }) => dbhCm!)) - sum(truth)) / truth.length).toBeLessThan(5 * standardError);
  });

  it('the tract is in inches, feet and acres: 12 plots of a tenth of an acre, breast height 4.5 ft, no visits', () => {
    const [project] = recordsOf(tract.design, 'project');
    expect(project).toMatchObject({ dbhUnit: 'in', lengthUnit: 'ft', areaUnit: 'ac', dbhDecimals: 1, heightDecimals: 0, curveForm: 'curtis' });
    // 1 ft = 0.3048 m and 1 acre = 43,560 ft² exactly (international yard and pound agreement of 1959).
    expect(project!.breastHeightM).toBeCloseTo(4.5 * 0.3048, 12);
    expect(project!.plotDesign.areaM2).toBeCloseTo(4356 * 0.3048 ** 2, 9);
    expect(project!.plotDesign.radiusM).toBeCloseTo(37.2 * 0.3048, 4);
    expect(recordsOf(tract.design, 'plot')).toHaveLength(12);
    expect(recordsOf(tract.design, 'visit')).toHaveLength(0);
    expect(recordsOf(tract.design, 'speciesEntry').map(({ localName }) => localName)).toContain('black cherry');
  });
});
