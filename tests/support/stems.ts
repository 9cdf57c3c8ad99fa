import type { ProjectUnits, StemEntry } from '@/lib/checks/types';
import type { HeightCurve } from '@/lib/schema/design';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import { toCanonicalCm, toCanonicalM } from '@/lib/trees/units';
import { blackCherry } from './black-cherry';

export const metric: ProjectUnits = { dbhUnit: 'cm', lengthUnit: 'm', dbhDecimals: 1, heightDecimals: 1, breastHeightM: 1.3 };
export const us: ProjectUnits = { dbhUnit: 'in', lengthUnit: 'ft', dbhDecimals: 1, heightDecimals: 0, breastHeightM: 1.3716 };

/** A live, whole stem as typed in the project's units; `over` changes what a test is about. */
export function makeStem(units: ProjectUnits, dbh: string | null, height: string | null, over: Partial<StemEntry> = {}): StemEntry {
  const number = (digits: string) => Number(digits.replace(',', '.'));
  return {
    id: 'stem', plotId: 'plot', speciesId: 'species', curveGroup: 'group', status: 'live', form: 'whole',
    dbhDigits: dbh, dbhCm: dbh === null ? null : toCanonicalCm(number(dbh), units.dbhUnit),
    heightDigits: height, heightM: height === null ? null : toCanonicalM(number(height), units.lengthUnit),
    heightMethod: height === null ? null : 'measured', ...over,
  };
}

/** A published curve over what a fit found. */
export function makeCurve(fit: ReturnType<typeof fitHeightCurve>, over: Partial<HeightCurve> = {}): HeightCurve {
  if (fit.kind !== 'fit') throw new Error(fit.reason);
  const { kind: _kind, xtxInverse, ...numbers } = fit;
  return {
    ...numbers, xtxInverse: [...xtxInverse], id: 'curve', projectId: 'project', deleted: false, curveGroup: 'group', version: 1, source: 'a test',
    publishedAt: '2026-01-01T00:00:00.000Z', ...over,
  };
}

/** The Curtis curve of the 31 black cherry trees (Ryan, Joiner and Ryan 1976). */
export const cherryCurve = makeCurve(fitHeightCurve({
  form: 'curtis', breastHeightM: 1.3716, tauSquared: 0.5,
  trees: blackCherry.map(({ diameterIn, heightFt }) => ({ dCm: diameterIn * 2.54, hM: heightFt * 0.3048 })),
}));
