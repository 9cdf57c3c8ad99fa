import type { Quantity } from '@/lib/schema/field';
import { formatValue } from '@/lib/trees/format-value';
import { fromCanonicalCm, fromCanonicalM, toCanonicalCm, toCanonicalM } from '@/lib/trees/units';
import type { Hypothesis } from '../causes/hypotheses';
import type { Doubt, ProjectUnits, StemEntry } from '../types';
import type { Rule } from './rule';

function suggest(stem: StemEntry, { quantity, factor }: Hypothesis, units: ProjectUnits): Doubt['suggestion'] {
  const standing = quantity === 'dbh' ? stem.dbhCm : stem.heightM;
  if (standing === null) return null;
  const meant = standing * factor;
  if (quantity === 'dbh') {
    const digits = formatValue(fromCanonicalCm(meant, units.dbhUnit), units.dbhDecimals);
    return { quantity, digits, canonical: toCanonicalCm(Number(digits), units.dbhUnit) };
  }
  const digits = formatValue(fromCanonicalM(meant, units.lengthUnit), units.heightDecimals);
  return { quantity, digits, canonical: toCanonicalM(Number(digits), units.lengthUnit) };
}

/** A doubt about one value of a stem, with what is known of it; the rest is null. */
export function makeDoubt(rule: Pick<Rule, 'id' | 'moment'>, level: Doubt['level'], stem: StemEntry, quantity: Quantity, units: ProjectUnits, more: {
  readonly expected?: readonly [number, number] | null;
  readonly tail?: number | null;
  readonly named?: { readonly cause: Doubt['cause']; readonly hypothesis: Hypothesis; readonly probability: number } | null;
} = {}): Doubt {
  return {
    rule: rule.id, moment: rule.moment, level, quantity,
    enteredDigits: quantity === 'dbh' ? stem.dbhDigits : stem.heightDigits,
    enteredCanonical: quantity === 'dbh' ? stem.dbhCm : stem.heightM,
    expectedLow: more.expected?.[0] ?? null,
    expectedHigh: more.expected?.[1] ?? null,
    tailProbability: more.tail ?? null,
    cause: more.named?.cause ?? null,
    causeProbability: more.named?.probability ?? null,
    suggestion: more.named ? suggest(stem, more.named.hypothesis, units) : null,
  };
}
