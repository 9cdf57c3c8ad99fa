import type { Cause } from '@/lib/schema/field';

/**
 * How often each slip happens, per stem with both values entered. Common practice, no source: slips of a few in a thousand
 * each; they matter only against one another, since a cause is named by comparison.
 */
export const slipRates = {
  'dbh-other-unit': 0.004,
  'height-other-unit': 0.004,
  'girth-for-dbh': 0.004,
  'decimal-dbh': 0.006,
  'decimal-height': 0.006,
  unexplained: 0.005,
} as const satisfies Partial<Record<Cause, number>>;

/** Everything else was typed as it was meant. */
export const asTypedRate = 1 - Object.values(slipRates).reduce((sum, rate) => sum + rate, 0);
