import { diameterInterval } from './diameter-interval';
import { makeDoubt } from './make-doubt';
import type { Rule } from './rule';

/** Below this many times the rate a value gets a quiet mark only. */
export const QUIET_FACTOR = 5;

/**
 * Asks when a height has a two-sided predictive tail probability below the rate, marks quietly below five times it. When
 * the slip that explains it is in the diameter, the question is about the diameter.
 */
export const heightBandRule: Rule = {
  id: 'height-band',
  moment: 'tape',
  reason: 'Height and diameter do not go together for this species and plot.',
  source: 'Predictive Student t of a random-intercept height curve (Lappi 1991, For. Sci. 37:781; Gelman et al., Bayesian Data Analysis, ch. 14)',
  check: (stem, { units, band, heightRate, logDiameter, causes }) => {
    if (!band || stem.dbhCm === null || stem.heightM === null) return null;
    const tail = band.tail(stem.plotId, stem.dbhCm, stem.heightM);
    if (tail === null || tail >= QUIET_FACTOR * heightRate) return null;
    const level = tail < heightRate ? 'look' : 'quiet';
    const named = level === 'look' ? causes?.named ?? null : null;
    const quantity = named?.hypothesis.quantity ?? 'height';
    const interval = band.interval(stem.plotId, stem.dbhCm, 1 - heightRate);
    const expected = quantity === 'dbh'
      ? band.diametersFor(stem.plotId, stem.heightM, heightRate) ?? diameterInterval(logDiameter, 1 - heightRate)
      : interval && ([interval.lowM, interval.highM] as const);
    return makeDoubt(heightBandRule, level, stem, quantity, units, { expected, tail, named });
  },
};
