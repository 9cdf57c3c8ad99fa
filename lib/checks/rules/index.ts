import { dbhRangeRule } from './dbh-range';
import { hardLimitsRule } from './hard-limits';
import { heightBandRule } from './height-band';
import { heightNotAboveBreastHeightRule } from './height-not-above-breast-height';
import type { Rule } from './rule';
import { slendernessRule } from './slenderness';

/**
 * All rules, the most telling first: what cannot be comes before what is unlikely. Without a band a far diameter is the
 * question and not the height, which is only out of proportion to it.
 */
export const rules: readonly Rule[] = [hardLimitsRule, heightNotAboveBreastHeightRule, heightBandRule, dbhRangeRule, slendernessRule];
