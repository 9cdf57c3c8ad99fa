import { makeDoubt } from './make-doubt';
import type { Rule } from './rule';

/** Asks when a whole, live stem that has a diameter at breast height ends at or below it. */
export const heightNotAboveBreastHeightRule: Rule = {
  id: 'height-not-above-breast-height',
  moment: 'tape',
  reason: 'A stem with a diameter at breast height must end above it.',
  source: 'Follows from the definition of DBH',
  check: (stem, { units, band, causes }) => {
    if (!band) return null;
    if (stem.heightM === null || stem.heightM <= 0 || stem.heightM > units.breastHeightM) return null;
    const named = causes?.named?.hypothesis.quantity === 'height' ? causes.named : null;
    return makeDoubt(heightNotAboveBreastHeightRule, 'look', stem, 'height', units, { named });
  },
};
