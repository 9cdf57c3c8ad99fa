import { describe, expect, it } from 'vitest';
import { compareWithPlanned } from '@/lib/position/compare-with-planned';
import { geodesicBetween, geodesicFrom } from '@/lib/position/geodesic';
import { openProjectGrid } from '@/lib/position/open-project-grid';
import { polygonArea } from '@/lib/position/polygon-area';
import { standContainment } from '@/lib/position/stand-containment';
import { given } from '../../support/given';

const dms = (d: number, m: number, s: number) => Math.sign(d) * (Math.abs(d) + m / 60 + s / 3600);

describe('geodesics published elsewhere', () => {
  it('Flinders Peak to Buninyong: 54972.271 m, 306 52 05.37, from the far end 127 10 25.07 (GDA technical manual; GRS80, 0.1 mm from WGS 84)', () => {
    const line = given(geodesicBetween({ lat: dms(-37, 57, 3.7203), lon: dms(144, 25, 29.5244) }, { lat: dms(-37, 39, 10.1561), lon: dms(143, 55, 35.3839) }));
    expect(line.distanceM).toBeCloseTo(54972.271, 3);
    expect(line.azimuthDeg + 360).toBeCloseTo(dms(306, 52, 5.37), 5);
    expect(line.onwardAzimuthDeg + 180).toBeCloseTo(dms(127, 10, 25.07), 5);
  });

  // Karney 2013, Journal of Geodesy 87:43: published test values of the method
  it.each([
    ['New York to London', 40.6, -73.8, 51.6, -0.5, 5551759.400319],
    ['Wellington to Spain, nearly antipodal', -41.32, 174.81, 40.96, -5.5, 19959679.267354],
  ])('%s', (_, lat1, lon1, lat2, lon2, metres) => {
    expect(given(geodesicBetween({ lat: lat1, lon: lon1 }, { lat: lat2, lon: lon2 })).distanceM).toBeCloseTo(metres, 6);
  });

  it('a ten-thousandth degree each way at 45 N is 13.626109 m (recomputed in double precision)', () => {
    expect(given(geodesicBetween({ lat: 45, lon: 9.5 }, { lat: 45.0001, lon: 9.5001 })).distanceM).toBeCloseTo(13.626109, 6);
  });

  it('a bad place or line is refused', () => {
    expect(geodesicBetween({ lat: 90.1, lon: 0 }, { lat: 0, lon: 0 })).toEqual({ kind: 'refused', reason: 'bad-place' });
    expect(geodesicFrom({ lat: 0, lon: 0 }, NaN, 1)).toEqual({ kind: 'refused', reason: 'bad-line' });
    expect(polygonArea([{ lat: 0, lon: 0 }, { lat: 1, lon: 0 }])).toEqual({ kind: 'refused', reason: 'too-few-corners' });
  });
});

describe('the planned centre', () => {
  const grid = given(openProjectGrid('EPSG:32633'));
  const planned = { lat: 47.3, lon: 12.2 };
  const standing = (azimuth: number, metres: number, r95M: number) => ({ ...given(geodesicFrom(planned, azimuth, metres)), r95M });

  it('grid distance is the ground distance times the scale, grid bearing the true one less the convergence', () => {
    const here = standing(20, 500, 10);
    const result = given(compareWithPlanned(here, planned, grid, 0));
    expect(result.distanceM).toBeCloseTo(500, 6);
    expect(result.trueBearingDeg).toBeCloseTo(200, 2);
    // Snyder 1987, eq. 8-11 in its first term k0 (1 + x²/2R²), and convergence sin(lat) times the longitude difference
    const away = 2.8 * Math.PI / 180 * Math.cos(47.3 * Math.PI / 180);
    expect(result.gridDistanceM / result.distanceM).toBeCloseTo(0.9996 * (1 + away ** 2 / 2), 5);
    const convergence = Math.atan(Math.tan(-2.8 * Math.PI / 180) * Math.sin(47.3 * Math.PI / 180)) * 180 / Math.PI;
    expect(result.gridBearingDeg).toBeCloseTo(result.trueBearingDeg - convergence, 2);
  });

  it('a grid in feet gives the same metres', () => {
    const feet = given(openProjectGrid('+proj=tmerc +lat_0=0 +lon_0=15 +k=0.9996 +x_0=500000 +y_0=0 +datum=WGS84 +units=us-ft'));
    const here = standing(20, 500, 10);
    expect(given(compareWithPlanned(here, planned, feet, 0)).gridDistanceM).toBeCloseTo(given(compareWithPlanned(here, planned, grid, 0)).gridDistanceM, 6);
  });

  it('far is said only beyond the 95 % radius plus what is allowed', () => {
    const verdict = (metres: number, r95M: number, allowedM: number) => given(compareWithPlanned(standing(90, metres, r95M), planned, grid, allowedM)).verdict;
    expect(verdict(12.1, 12, 0)).toBe('far');
    expect(verdict(11.9, 12, 0)).toBe('not-shown-far');
    expect(verdict(15, 12, 5)).toBe('not-shown-far');
    expect(verdict(17.1, 12, 5)).toBe('far');
  });

  it('at the planned centre the distance is 0, and places the grid cannot hold are refused', () => {
    expect(given(compareWithPlanned({ ...planned, r95M: 5 }, planned, grid, 0))).toMatchObject({ distanceM: 0, gridDistanceM: 0, gridBearingDeg: 0, verdict: 'not-shown-far' });
    expect(compareWithPlanned({ lat: 0, lon: 110, r95M: 5 }, planned, grid, 0)).toEqual({ kind: 'refused', reason: 'outside-projection' });
  });
});

describe('inside the stand', () => {
  const corner = { lat: 61.5, lon: 25 };
  const go = (from: { lat: number; lon: number }, azimuth: number, metres: number) => given(geodesicFrom(from, azimuth, metres));
  const square = [corner, go(corner, 90, 100), go(go(corner, 90, 100), 0, 100), go(corner, 0, 100)];
  const at = (east: number, north: number, r95M = 5) => ({ ...go(go(corner, 90, east), 0, north), r95M });

  it.each([
    [50, 50, true, 50, 'inside'],
    [50, 4, true, 4, 'not-shown'],
    [50, -4, false, 4, 'not-shown'],
    [50, -30, false, 30, 'outside'],
    [-30, -40, false, 50, 'outside'],
  ] as const)('%d m east and %d m north of the corner: inside %s, %d m from the edge, %s', (east, north, inside, metres, verdict) => {
    const result = given(standContainment(at(east, north), [square]));
    expect(result).toMatchObject({ inside, verdict });
    expect(result.distanceToEdgeM).toBeCloseTo(metres, 2);
  });

  it('a hole is outside, its edge counts', () => {
    const hole = [at(40, 40), at(60, 40), at(60, 60), at(40, 60)];
    expect(given(standContainment(at(50, 50), [square, hole]))).toMatchObject({ inside: false, verdict: 'outside' });
    expect(given(standContainment(at(20, 50), [square, hole]))).toMatchObject({ inside: true, verdict: 'inside' });
  });

  it('a stand across the 180th meridian works like any other', () => {
    const ring = [[-16.8, 179.995], [-16.8, -179.995], [-16.79, -179.995], [-16.79, 179.995]].map(([lat, lon]) => ({ lat: lat!, lon: lon! }));
    expect(given(standContainment({ lat: -16.795, lon: 179.9999, r95M: 10 }, [ring])).verdict).toBe('inside');
    expect(given(standContainment({ lat: -16.795, lon: -179.99, r95M: 10 }, [ring])).verdict).toBe('outside');
  });

  it('no outline and bad places are refused', () => {
    expect(standContainment(at(0, 0), [])).toEqual({ kind: 'refused', reason: 'no-outline' });
    expect(standContainment(at(0, 0), [square.slice(0, 2)])).toEqual({ kind: 'refused', reason: 'no-outline' });
    expect(standContainment({ lat: NaN, lon: 0, r95M: 1 }, [square])).toEqual({ kind: 'refused', reason: 'bad-place' });
  });
});
