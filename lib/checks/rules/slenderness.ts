import { makeDoubt } from './make-doubt';
import type { Rule } from './rule';

/** Height over diameter, both in m, is usually about 40–130; outside these it is asked about. */
export const LEAST_SLENDERNESS = 25;
export const MOST_SLENDERNESS = 200;

/** Where there is no band: asks about a height that no tree of this diameter could carry. */
export const slendernessRule: Rule = {
  id: 'slenderness',
  moment: 'tape',
  reason: 'The height is out of all proportion to the diameter.',
  source: 'Slenderness 40–130 as usual, 25–200 as limits: common practice, from memory',
  check: (stem, { units, band, causes }) => {
    if (stem.dbhCm === null || stem.heightM === null || stem.dbhCm <= 0 || stem.heightM <= 0) return null;
    if (!band || band.predict(stem.plotId, stem.dbhCm)) return null;
    const slenderness = (100 * stem.heightM) / stem.dbhCm;
    if (slenderness >= LEAST_SLENDERNESS && slenderness <= MOST_SLENDERNESS) return null;
    const named = causes?.named ?? null;
    const quantity = named?.hypothesis.quantity ?? 'height';
    const expected = quantity === 'height'
      ? ([(LEAST_SLENDERNESS * stem.dbhCm) / 100, (MOST_SLENDERNESS * stem.dbhCm) / 100] as const)
      : ([(100 * stem.heightM) / MOST_SLENDERNESS, (100 * stem.heightM) / LEAST_SLENDERNESS] as const);
    return makeDoubt(slendernessRule, 'look', stem, quantity, units, { expected, named });
  },
};
