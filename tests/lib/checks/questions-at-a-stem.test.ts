import { describe, expect, it } from 'vitest';
import { createScreen } from '@/lib/checks/screen';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import { curtisStand } from '../../support/curtis-stand';
import { makeCurve, makeStem, metric } from '../../support/stems';

const curve = makeCurve(fitHeightCurve({ form: 'curtis', breastHeightM: 1.3, tauSquared: 0.5, trees: curtisStand('the curve', 400) }));
const stand = () => createScreen({ alarmRatePer100: 1, tauSquared: 0.5, curveForm: 'curtis', units: metric, curves: [curve] });

describe('a stem without an expected height', () => {
  const broken = { form: 'broken' as const };

  it.each([{ status: 'dead' as const }, broken, { form: 'leaning' as const }, { form: 'forked' as const }])('%o: not even a height below breast height is asked about', (over) => {
    expect(stand().screen(makeStem(metric, '30', '1.2', over))).toEqual([]);
  });

  it('is still asked about what no tree can be, in height and in diameter', () => {
    expect(stand().screen(makeStem(metric, '30', '120', broken))).toMatchObject([{ rule: 'hard-limits', level: 'look', quantity: 'height' }]);
    expect(stand().screen(makeStem(metric, '1300', '20', broken))[0]).toMatchObject({ rule: 'hard-limits', level: 'look', quantity: 'dbh' });
  });

  it('is still asked about a diameter far from its species, the cause from the diameter alone', () => {
    expect(stand().screen(makeStem(metric, '270', '12', broken))).toMatchObject([
      { rule: 'dbh-range', level: 'look', quantity: 'dbh', cause: 'decimal-dbh', suggestion: { digits: '27.0' } },
    ]);
  });
});

describe('at most one question at a stem', () => {
  const grid = ['0', '2.7', '12', '27', '85', '270', '1300'].flatMap((d) => [null, '0', '1.2', '2.3', '14', '23', '75', '230'].map((h) => [d, h] as const));

  it.each(grid)('dbh %s, height %s: the first doubt is the only one that asks', (d, h) => {
    const doubts = stand().screen(makeStem(metric, d, h));
    expect(doubts.slice(1).filter(({ level }) => level === 'look')).toEqual([]);
    expect(new Set(doubts.map(({ rule }) => rule)).size).toBe(doubts.length);
  });

  it('is about the diameter when no tree of the species is that thick, not about the height that it makes look short', () => {
    const [first] = stand().screen(makeStem(metric, '180', '23.5'));
    expect(first).toMatchObject({ level: 'look', quantity: 'dbh', rule: 'dbh-range' });
  });
});
