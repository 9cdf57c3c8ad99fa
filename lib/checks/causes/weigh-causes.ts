import type { Cause } from '@/lib/schema/field';
import { predictiveLogDensity } from '@/lib/stats/mixed/plot-intercept';
import type { Predictive } from '@/lib/stats/mixed/plot-intercept';
import type { Hypothesis } from './hypotheses';
import { asTypedRate, slipRates } from './slip-rates';

/** The densities of ln d and, given d, of ln(h − bh), as learned so far. */
export type TreeDensity = {
  readonly breastHeightM: number;
  readonly logDiameter: Predictive;
  readonly height: (dCm: number) => Predictive | null;
};

export type WeighedCauses = {
  /** Posterior probability that the entry is what was meant. */
  readonly asTyped: number;
  readonly causes: readonly { readonly cause: Cause; readonly hypothesis: Hypothesis | null; readonly probability: number }[];
  /** The cause to name: above one half and at least `CLEARLY` times the second best, else null. */
  readonly named: { readonly cause: Cause; readonly hypothesis: Hypothesis; readonly probability: number } | null;
};

/** A cause is named only when it beats the second best by this factor (between 2 and 3). */
export const CLEARLY = 2.5;
/** Log of the broad density of an unexplained entry: even on ln d over 1–300 cm and on ln h over 1.3–116 m. */
const UNEXPLAINED_LOG_D = -Math.log(Math.log(300));
const UNEXPLAINED_LOG_H = -Math.log(Math.log(116 / 1.3));

function logDensity(density: TreeDensity, dCm: number, hM: number | null): number {
  const diameter = predictiveLogDensity(density.logDiameter, Math.log(dCm));
  if (hM === null) return diameter;
  const above = hM - density.breastHeightM;
  const height = above > 0 ? density.height(dCm) : null;
  if (!height) return -Infinity;
  // From ln(h − bh) to ln h.
  return diameter + predictiveLogDensity(height, Math.log(above)) + Math.log(hM / above);
}

/**
 * Compares what may have happened to an entry: P(cause | typed) ∝ rate · density of what would have been meant.
 *
 * @param dCm, hM as entered, canonical; without a height the diameter speaks alone
 * @returns probabilities that sum to one over as typed, every cause and unexplained
 * Source: Bayes' rule with the project's own predictive densities; naming threshold: own choice.
 */
export function weighCauses(entry: { readonly dCm: number; readonly hM: number | null }, density: TreeDensity, slips: readonly Hypothesis[]): WeighedCauses {
  const { dCm, hM } = entry;
  const usable = hM === null ? slips.filter(({ quantity }) => quantity === 'dbh') : slips;
  const terms: { cause: Cause | null; hypothesis: Hypothesis | null; log: number }[] = [
    { cause: null, hypothesis: null, log: Math.log(asTypedRate) + logDensity(density, dCm, hM) },
    { cause: 'unexplained', hypothesis: null, log: Math.log(slipRates.unexplained) + UNEXPLAINED_LOG_D + (hM === null ? 0 : UNEXPLAINED_LOG_H) },
    ...usable.map((hypothesis) => ({
      cause: hypothesis.cause, hypothesis,
      log: Math.log(hypothesis.rate) + (hypothesis.quantity === 'dbh'
        ? logDensity(density, dCm * hypothesis.factor, hM)
        : logDensity(density, dCm, hM === null ? null : hM * hypothesis.factor)),
    })),
  ];
  const most = Math.max(...terms.map(({ log }) => log));
  const weights = terms.map(({ log }) => Math.exp(log - most));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const causes = terms.flatMap(({ cause, hypothesis }, i) => (cause ? [{ cause, hypothesis, probability: weights[i]! / total }] : []))
    .sort((a, b) => b.probability - a.probability);
  const asTyped = weights[0]! / total;
  const [best, second] = causes;
  const rival = Math.max(second?.probability ?? 0, asTyped);
  const clear = best?.hypothesis && best.probability > 0.5 && best.probability >= CLEARLY * rival;
  return { asTyped, causes, named: clear && best.hypothesis ? { cause: best.cause, hypothesis: best.hypothesis, probability: best.probability } : null };
}
