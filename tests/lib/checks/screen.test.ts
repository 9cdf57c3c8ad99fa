import { describe, expect, it } from 'vitest';
import { createScreen } from '@/lib/checks/screen';
import type { StemEntry } from '@/lib/checks/types';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import { cherryCurve, makeCurve, makeStem, metric, us } from '../../support/stems';
import { curtisStand } from '../../support/curtis-stand';

const defaults = { alarmRatePer100: 1, tauSquared: 0.5, curveForm: 'curtis' } as const;
const cherry = () => createScreen({ ...defaults, units: us, curves: [cherryCurve] });
const standCurve = makeCurve(fitHeightCurve({ form: 'curtis', breastHeightM: 1.3, tauSquared: 0.5, trees: curtisStand('the curve', 400) }));
const stand = () => createScreen({ ...defaults, units: metric, curves: [standCurve] });
const rules = (doubts: readonly { rule: string; level: string }[]) => doubts.map(({ rule, level }) => `${rule}:${level}`);

describe('the black cherry curve in a project of inches and feet', () => {
  it('asks about 24 typed as feet on a 14 in tree, names metres and suggests 79 ft', () => {
    const [doubt, ...more] = cherry().screen(makeStem(us, '14', '24'));
    expect(more).toEqual([]);
    expect(doubt).toMatchObject({ rule: 'height-band', level: 'look', quantity: 'height', cause: 'height-other-unit', suggestion: { quantity: 'height', digits: '79' } });
    expect(doubt!.causeProbability).toBeGreaterThan(0.9);
  });

  it('lets 80 ft pass without a word, not even a mark', () => {
    expect(cherry().screen(makeStem(us, '14', '80'))).toEqual([]);
  });

  it('shows the published 99 % band of a 14 in tree', () => {
    const band = cherry().band(makeStem(us, '14', null), 0.99);
    if (band.kind !== 'band') throw new Error(band.reason);
    expect(band.lowM / 0.3048).toBeCloseTo(62.9473, 3);
    expect(band.highM / 0.3048).toBeCloseTo(95.1286, 3);
    expect(band.source).toBe('curve');
  });
});

describe('likely causes in a metric stand with a published curve', () => {
  const tree = { d: 30, h: standCurve.breastHeightM + Math.exp(standCurve.b0 + standCurve.b1 * Math.log(30 / 31)) };
  const height = tree.h.toFixed(1);

  it.each([
    ['a diameter in inches', (tree.d / 2.54).toFixed(1), height, 'dbh-other-unit', 'dbh', 30],
    ['a girth', (tree.d * Math.PI).toFixed(1), height, 'girth-for-dbh', 'dbh', 30],
    ['a slipped decimal of the diameter', '300', height, 'decimal-dbh', 'dbh', 30],
    ['a height in feet', '30', (tree.h / 0.3048).toFixed(0), 'height-other-unit', 'height', tree.h],
    ['a slipped decimal of the height', '30', (tree.h / 10).toFixed(2), 'decimal-height', 'height', tree.h],
  ] as const)('%s is named, with the value that was meant', (_what, dbh, h, cause, quantity, meant) => {
    const looks = stand().screen(makeStem(metric, dbh, h)).filter(({ level }) => level === 'look');
    expect(looks).toHaveLength(1);
    expect(looks[0]).toMatchObject({ cause, quantity });
    expect(Math.abs(looks[0]!.suggestion!.canonical / meant - 1)).toBeLessThan(0.02);
  });

  it('a doubt about the diameter shows the diameters that would go with the height', () => {
    const screen = stand();
    const [doubt] = screen.screen(makeStem(metric, (tree.d / 2.54).toFixed(1), height));
    expect(doubt).toMatchObject({ quantity: 'dbh', rule: 'height-band' });
    expect(doubt!.enteredCanonical!).toBeLessThan(doubt!.expectedLow!);
    // At its edge the height stops being a surprise: silent just inside, asked about just outside.
    const looks = (d: number) => screen.screen(makeStem(metric, '30', height, { dbhCm: d })).filter(({ rule, level }) => rule === 'height-band' && level === 'look').length;
    expect([looks(doubt!.expectedLow! * 1.002), looks(doubt!.expectedLow! * 0.998)]).toEqual([0, 1]);
  });

  it('243 for 24.3 is seen from the diameter alone', () => {
    expect(stand().screen(makeStem(metric, '243', null))[0]).toMatchObject({ rule: 'dbh-range', level: 'look', cause: 'decimal-dbh', suggestion: { digits: '24.3' } });
  });

  it('names no cause where none is clear', () => {
    const odd = (tree.h * 1.35).toFixed(1);
    expect(stand().screen(makeStem(metric, '30', odd))[0]).toMatchObject({ rule: 'height-band', level: 'look', cause: null, suggestion: null });
  });
});

describe('each rule on both sides of its edge', () => {
  const at = (tail: number): StemEntry => {
    // The height whose two-sided tail is `tail`, found on the band's own limit.
    const band = stand().band(makeStem(metric, '30', null), 1 - tail);
    if (band.kind !== 'band') throw new Error(band.reason);
    return makeStem(metric, '30', null, { heightDigits: '0', heightM: band.highM, heightMethod: 'measured' });
  };

  it.each([[0.0089, 'height-band:look'], [0.0091, 'height-band:quiet'], [0.0449, 'height-band:quiet']])('height-band: a tail of %d gives %s', (tail, expected) => {
    expect(rules(stand().screen(at(tail)))).toEqual([expected]);
  });
  it('height-band: above five times the rate it is silent', () => {
    expect(stand().screen(at(0.0451))).toEqual([]);
  });

  it.each([['116', []], ['116.1', ['height']]] as const)('hard-limits: %s m', (h, expected) => {
    const hits = createScreen({ ...defaults, units: metric, curves: [] }).screen(makeStem(metric, '500', h)).filter(({ rule }) => rule === 'hard-limits');
    expect(hits.map(({ quantity }) => quantity)).toEqual(expected);
  });
  it.each([['1200', 0], ['1200.1', 1], ['0', 1]])('hard-limits: %s cm', (d, count) => {
    expect(stand().screen(makeStem(metric, d, null)).filter(({ rule }) => rule === 'hard-limits')).toHaveLength(count);
  });

  it.each([['1.3', 1], ['1.4', 0]])('height-not-above-breast-height: %s m', (h, count) => {
    expect(stand().screen(makeStem(metric, '30', h)).filter(({ rule }) => rule === 'height-not-above-breast-height')).toHaveLength(count);
  });

  // Far beyond all diameters there is no band; then only slenderness (25 to 200) speaks of the height.
  it.each([['75', 0], ['74.9', 1]])('slenderness of a 300 cm tree: %s m', (h, count) => {
    expect(stand().screen(makeStem(metric, '300', h)).filter(({ rule }) => rule === 'slenderness')).toHaveLength(count);
  });

  it('no band beyond a quarter outside the known diameters, a wider one before', () => {
    const top = standCurve.dMaxCm;
    const reading = (d: number) => stand().band(makeStem(metric, String(d), null), 0.99);
    expect(reading(top * 1.26)).toEqual({ kind: 'none', reason: 'outside-diameters' });
    expect(reading(top * 1.24)).toMatchObject({ kind: 'band', widened: true });
    expect(reading(top * 0.99)).toMatchObject({ kind: 'band', widened: false });
  });
});

describe('which stems have a band and which teach', () => {
  it.each([{ status: 'dead' as const }, { form: 'broken' as const }, { form: 'leaning' as const }, { form: 'forked' as const }])('no height is expected of %o', (over) => {
    expect(stand().band(makeStem(metric, '30', '5', over), 0.99)).toEqual({ kind: 'none', reason: 'no-height-expected' });
    expect(stand().screen(makeStem(metric, '30', '5', over))).toEqual([]);
  });

  const teachAll = (teaching: 'undoubted' | 'open' | 'measured-twice' | 'accepted', over: Partial<StemEntry> = {}) => {
    const screen = stand();
    for (let i = 0; i < 8; i++) screen.teach(makeStem(metric, '30', '18', { id: `taught ${i}`, ...over }), teaching);
    const band = screen.band(makeStem(metric, '30', null), 0.99);
    return band.kind === 'band' ? band.medianM : Number.NaN;
  };
  const before = (() => { const band = stand().band(makeStem(metric, '30', null), 0.99); return band.kind === 'band' ? band.medianM : Number.NaN; })();

  it('trees measured twice move the band of their plot, open doubts and broken stems do not', () => {
    expect(teachAll('measured-twice')).toBeLessThan(before - 0.5);
    expect(teachAll('open')).toBe(before);
    expect(teachAll('measured-twice', { form: 'broken' })).toBe(before);
    expect(teachAll('undoubted', { heightMethod: 'estimated' })).toBe(before);
  });
  it('an undoubted tree teaches no more than one measured twice', () => {
    expect(teachAll('undoubted')).toBeGreaterThanOrEqual(teachAll('measured-twice'));
  });

  it('a stem is never judged by what it taught itself', () => {
    const screen = stand();
    const stem = makeStem(metric, '30', '18');
    const alone = screen.band(stem, 0.99);
    screen.teach(stem, 'measured-twice');
    expect(screen.band(stem, 0.99)).toEqual(alone);
    screen.forget(stem.id);
    expect(screen.band(stem, 0.99)).toEqual(alone);
  });
});

describe('the weak start, before any curve', () => {
  const weak = () => createScreen({ ...defaults, units: metric, curves: [] });
  it('catches a height in feet on a 30 cm tree and lets the right one pass', () => {
    expect(rules(weak().screen(makeStem(metric, '30', '70')))).toEqual(['height-band:look']);
    expect(weak().screen(makeStem(metric, '30', '21.3'))).toEqual([]);
  });
  it('lets unusual but sound stands pass: slenderness 50 to 110 at 20 cm', () => {
    for (const h of ['10', '14', '18', '22']) expect(weak().screen(makeStem(metric, '20', h)).filter(({ level }) => level === 'look')).toEqual([]);
  });
  it('takes the pooled curve for a group that has none of its own', () => {
    const band = createScreen({ ...defaults, units: metric, curves: [{ ...standCurve, curveGroup: '*' }] }).band(makeStem(metric, '30', null, { curveGroup: 'another' }), 0.99);
    expect(band).toMatchObject({ kind: 'band', source: 'pooled' });
  });
});

describe('the alarm rate on correct trees', () => {
  it('is one look per 100 within the 99 % binomial interval (normal approximation, n = 6000; Brown, Cai and DasGupta 2001)', () => {
    const screen = stand();
    const trees = curtisStand('honest crews', 6000);
    let looks = 0;
    trees.forEach(({ dCm, hM, plot }, i) => {
      const stem = makeStem(metric, dCm.toFixed(1), hM.toFixed(1), { id: `tree ${i}`, plotId: plot });
      const asked = screen.screen(stem).some(({ level }) => level === 'look');
      if (asked) looks += 1;
      screen.teach(stem, asked ? 'measured-twice' : 'undoubted');
    });
    const expected = 0.01 * trees.length;
    const reach = 2.576 * Math.sqrt(expected * 0.99);
    expect(looks).toBeGreaterThan(expected - reach);
    expect(looks).toBeLessThan(expected + reach);
  });
});
