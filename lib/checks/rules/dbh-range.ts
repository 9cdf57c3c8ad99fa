import { predictiveTail } from '@/lib/stats/mixed/plot-intercept';
import { diameterInterval } from './diameter-interval';
import { QUIET_FACTOR } from './height-band';
import { makeDoubt } from './make-doubt';
import type { Rule } from './rule';

/** Asks when a diameter lies far outside the diameters of its species: alone, before there is a height. */
export const dbhRangeRule: Rule = {
  id: 'dbh-range',
  moment: 'tape',
  reason: 'The diameter is far from all diameters known for this species here.',
  source: 'Predictive distribution of log-normal diameters (Gelman et al., Bayesian Data Analysis, section 3.3)',
  check: (stem, { units, diameterRate, logDiameter, causes }) => {
    if (stem.dbhCm === null || stem.dbhCm <= 0) return null;
    const tail = predictiveTail(logDiameter, Math.log(stem.dbhCm));
    if (tail >= QUIET_FACTOR * diameterRate) return null;
    const level = tail < diameterRate ? 'look' : 'quiet';
    const named = level === 'look' && causes?.named?.hypothesis.quantity === 'dbh' ? causes.named : null;
    return makeDoubt(dbhRangeRule, level, stem, 'dbh', units, { expected: diameterInterval(logDiameter, 1 - diameterRate), tail, named });
  },
};
