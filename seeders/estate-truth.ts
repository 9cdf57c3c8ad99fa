import { estateForest } from './estate-forest';
import type { PlotTruth } from './estate-forest';
import { estateGroups } from './estate-groups';
import type { GroupTruth } from './estate-groups';

/** The seed of the demo that `npm run demo` sows. */
export const DEMO_SEED = 'lammas-growth';

/** All that is true of the invented estate: what an inventory of it tries to find out. */
export type EstateTruth = {
  readonly seed: string;
  readonly breastHeightM: 1.3;
  /** Standard deviation of ln(h − bh) of a measured height about its plot's curve: trees and hypsometer together. */
  readonly sigma: number;
  /** Variance of the plot effects over sigma². */
  readonly tauSquared: number;
  /** Smallest diameter that is tallied, cm. */
  readonly dbhThresholdCm: number;
  readonly plotAreaHa: number;
  readonly groups: readonly GroupTruth[];
  /** All 60 plots with every stem that stands on them, whether visited before or not. */
  readonly plots: readonly PlotTruth[];
};

/**
 * The truth of the estate that a seed makes: a pure function, the same for the same seed. A height is made as
 * ln(h − 1.3) = ln(median(d) − 1.3) + u_plot + e, with u_plot ~ N(0, tauSquared·sigma²) shared by all species of a plot and
 * e ~ N(0, sigma²) per stem. The model is that of lib/stats; the curves are not all of its forms.
 */
export function estateTruth(seed: string = DEMO_SEED): EstateTruth {
  const sigma = 0.08;
  const tauSquared = 0.5;
  const dbhThresholdCm = 7;
  const plotAreaHa = 0.04;
  return {
    seed, breastHeightM: 1.3, sigma, tauSquared, dbhThresholdCm, plotAreaHa,
    groups: estateGroups,
    plots: estateForest(seed, { sigma, tauSquared, dbhThresholdCm, plotAreaHa }),
  };
}
