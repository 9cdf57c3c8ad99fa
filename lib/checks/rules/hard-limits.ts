import type { Doubt } from '../types';
import { makeDoubt } from './make-doubt';
import type { Rule } from './rule';

/** No tree is known to be taller or thicker; above these an entry cannot be right. */
export const MOST_HEIGHT_M = 116;
export const MOST_DBH_CM = 1200;

/** Asks about what no tree can be: zero, above 116 m, above 1200 cm. */
export const hardLimitsRule: Rule = {
  id: 'hard-limits',
  moment: 'tape',
  reason: 'No tree is that large, or the value is zero.',
  source: 'Largest trees known, from memory; common practice, no source for the limits as set',
  check: (stem, { units, causes }): Doubt | null => {
    const named = (quantity: 'dbh' | 'height') => (causes?.named?.hypothesis.quantity === quantity ? causes.named : null);
    if (stem.dbhCm !== null && (stem.dbhCm <= 0 || stem.dbhCm > MOST_DBH_CM)) {
      return makeDoubt(hardLimitsRule, 'look', stem, 'dbh', units, { named: named('dbh') });
    }
    if (stem.heightM !== null && (stem.heightM <= 0 || stem.heightM > MOST_HEIGHT_M)) {
      return makeDoubt(hardLimitsRule, 'look', stem, 'height', units, { named: named('height') });
    }
    return null;
  },
};
