import { describe, expect, it } from 'vitest';
import { findCrs, shippedCrs } from '@/lib/position/crs-definitions';
import { gridFactors } from '@/lib/position/grid-factors';
import { openProjectGrid } from '@/lib/position/open-project-grid';
import { openProjection } from '@/lib/position/open-projection';
import { given } from '../../support/given';

const dms = (degrees: number, minutes: number, seconds = 0) => degrees + minutes / 60 + seconds / 3600;

describe('published grid coordinates', () => {
  const osgb = given(given(openProjectGrid('EPSG:27700')).projection);

  it('EPSG Guidance Note 7-2, Transverse Mercator: 50 30 N 0 30 E on OSGB36, to 0.01 m as printed', () => {
    const { easting, northing } = given(osgb.toGrid({ lat: dms(50, 30), lon: dms(0, 30) }));
    expect(Math.abs(easting - 577274.99)).toBeLessThan(0.01);
    expect(Math.abs(northing - 69740.5)).toBeLessThan(0.01);
  });

  it('Ordnance Survey, A guide to coordinate systems in Great Britain: Caister water tower, to 0.001 m', () => {
    const { easting, northing } = given(osgb.toGrid({ lat: dms(52, 39, 27.2531), lon: dms(1, 43, 4.5177) }));
    expect(easting).toBeCloseTo(651409.903, 3);
    expect(northing).toBeCloseTo(313177.27, 3);
  });

  it('Snyder 1987, USGS Professional Paper 1395: Clarke 1866 at 40.5 N 73.5 W, coordinates and scale as printed', () => {
    const snyder = given(openProjection('+proj=tmerc +lat_0=0 +lon_0=-75 +k=0.9996 +ellps=clrk66 +units=m'));
    const place = { lat: 40.5, lon: -73.5 };
    const { easting, northing } = given(snyder.toGrid(place));
    expect(easting).toBeCloseTo(127106.5, 1);
    expect(northing).toBeCloseTo(4484124.4, 1);
    expect(given(gridFactors(snyder, place)).scale).toBeCloseTo(0.9997989, 7);
  });

  // Recomputed in double precision with an exact series, from the project's list of standards.
  it.each([
    ['EPSG:32632', 45, 9.5, 539407.649, 4983071.9876],
    ['EPSG:32635', 60.123456, 24.654321, 369669.5757, 6667474.1144],
    ['EPSG:32759', -43.5321, 172.6362, 632208.3419, 5178793.2605],
  ])('WGS 84 / UTM %s', (code, lat, lon, easting, northing) => {
    const grid = given(given(openProjectGrid(code)).fromWgs84({ lat, lon }));
    expect(grid.easting).toBeCloseTo(easting, 3);
    expect(grid.northing).toBeCloseTo(northing, 3);
  });

  it('a position of a phone reaches the British grid through the datum shift and comes back', () => {
    const grid = given(openProjectGrid('EPSG:27700'));
    // London on OSGB36 and its WGS 84 place by EPSG:1314: PROJ 9.1.1, tests/reference/10-geodesy/datum_shift.json
    const wgs84 = { lat: 51.50901022639054, lon: -0.12730658557939 };
    const own = given(grid.projection.toGrid({ lat: 51.5085, lon: -0.1257 }));
    const there = given(grid.fromWgs84(wgs84));
    // The height lost on the way (about 45 m, times a tilt of 5 arc-seconds between the two normals) is worth 1 mm.
    expect(Math.hypot(there.easting - own.easting, there.northing - own.northing)).toBeLessThan(2e-3);
    const back = given(grid.toWgs84(there));
    expect(Math.abs(back.lat - wgs84.lat)).toBeLessThan(2e-8);
    expect(Math.abs(back.lon - wgs84.lon)).toBeLessThan(2e-8);
    expect(grid.crs.datumAccuracyM).toBe(2);
  });
});

describe('every system that ships', () => {
  it('opens, and a place in it comes back to 1e-10 degrees', () => {
    expect(shippedCrs).toHaveLength(121);
    for (const { code } of shippedCrs.filter((crs) => crs.code !== 'EPSG:27700')) {
      const grid = given(openProjectGrid(code));
      const zone = Number(code.slice(-2));
      const place = { lat: code.startsWith('EPSG:326') ? 47.3 : -33.7, lon: zone * 6 - 182 };
      const back = given(grid.toWgs84(given(grid.fromWgs84(place))));
      expect(Math.abs(back.lat - place.lat) + Math.abs(back.lon - place.lon)).toBeLessThan(1e-10);
    }
  });
});

describe('refusals', () => {
  it.each([
    ['EPSG:99999', 'unknown-code'],
    ['hello', 'unknown-code'],
    ['+proj=nosuch +ellps=GRS80', 'unknown-projection'],
    ['+proj=longlat +datum=WGS84', 'unknown-projection'],
    ['+proj=tmerc +lat_0=0; rm', 'not-a-proj-string'],
    ['+proj=tmerc +lon_0=12 +ellps=atlantis', 'unknown-ellipsoid'],
    ['+proj=tmerc +lon_0=12 +datum=atlantis', 'unknown-datum'],
    ['+proj=tmerc +lon_0=12 +ellps=bessel', 'unknown-datum'],
    ['+proj=tmerc +lon_0=12 +ellps=bessel +towgs84=1,2', 'bad-parameter'],
    ['+proj=tmerc +lon_0=12 +ellps=bessel +nadgrids=BETA2007.gsb', 'needs-grid-file'],
    ['+proj=tmerc +lon_0=12 +ellps=GRS80 +units=furlong', 'unknown-unit'],
  ])('%s: %s', (setting, reason) => {
    expect(openProjectGrid(setting)).toEqual({ kind: 'refused', reason });
  });

  it('a place that is none, and one that the grid cannot hold, are refused', () => {
    const grid = given(openProjectGrid('EPSG:32632'));
    expect(grid.fromWgs84({ lat: 91, lon: 9 })).toEqual({ kind: 'refused', reason: 'bad-place' });
    expect(grid.fromWgs84({ lat: NaN, lon: 9 })).toEqual({ kind: 'refused', reason: 'bad-place' });
    expect(grid.fromWgs84({ lat: 0, lon: 99 })).toEqual({ kind: 'refused', reason: 'outside-projection' });
    expect(grid.toWgs84({ easting: Infinity, northing: 0 })).toEqual({ kind: 'refused', reason: 'bad-place' });
  });

  it('a code is found in any case, a custom string keeps an unknown datum accuracy', () => {
    expect(given(findCrs('epsg:32633')).name).toBe('WGS 84 / UTM zone 33N');
    expect(given(findCrs('+proj=tmerc +lon_0=12 +ellps=bessel +towgs84=598.1,73.7,418.2')).datumAccuracyM).toBeNull();
  });
});
