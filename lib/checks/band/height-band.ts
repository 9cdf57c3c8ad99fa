import type { HeightCurve } from '@/lib/schema/design';
import { curveForms } from '@/lib/stats/forms/curve-forms';
import type { CurveForm } from '@/lib/stats/forms/curve-forms';
import { PlotInterceptModel, predictiveInterval, predictiveTail } from '@/lib/stats/mixed/plot-intercept';
import type { Predictive } from '@/lib/stats/mixed/plot-intercept';
import { curvePrior } from './curve-prior';
import { DiameterRange } from './diameter-range';
import { WEAK_D_MAX_CM, WEAK_D_MIN_CM, weakPrior } from './weak-prior';

export type BandSource = 'curve' | 'pooled' | 'weak';
/** How many trees a prior counts as, at most. */
const WORTH: Readonly<Record<'curve' | 'pooled', number>> = { curve: 50, pooled: 10 };
/** Beyond the known diameters by more than this share there is no band. */
const REACH = 0.25;
/** Steps over ln d in which the diameters of a height are sought. */
const GRID = 60;
/** Only a tree that is more likely right than wrong stretches the known diameters. */
const LEAST_WEIGHT = 0.5;

type Taught = { readonly plotId: string; readonly dCm: number; readonly hM: number; readonly weight: number };

/** The expected heights of one curve group as they are learned. All lengths in m, diameters in cm. */
export class HeightBand {
  readonly source: BandSource;
  readonly #x: (dCm: number) => number;
  readonly #model: PlotInterceptModel;
  readonly #breastHeightM: number;
  readonly #taught = new Map<string, Taught>();
  readonly #known: readonly [number, number];
  readonly #diameters = new DiameterRange();

  /** The prior in order: the group's own curve, the pooled one, the weak start. */
  constructor(options: { readonly own?: HeightCurve | undefined; readonly pooled?: HeightCurve | undefined; readonly form: CurveForm; readonly breastHeightM: number; readonly tauSquared: number }) {
    const curve = options.own ?? options.pooled;
    this.source = options.own ? 'curve' : options.pooled ? 'pooled' : 'weak';
    this.#breastHeightM = options.breastHeightM;
    const form = curve?.form ?? options.form;
    this.#x = curveForms[form];
    const prior = curve && this.source !== 'weak' ? curvePrior(curve, WORTH[this.source]) : weakPrior(form, options.breastHeightM, options.tauSquared);
    this.#model = new PlotInterceptModel(prior, this.#x(curve ? Math.exp(curve.logDMean) : 25));
    this.#known = curve ? [curve.dMinCm, curve.dMaxCm] : [WEAK_D_MIN_CM, WEAK_D_MAX_CM];
  }

  /** O(1): the tree teaches with this weight (0 < weight ≤ 1), or differently than before. */
  teach(id: string, tree: Taught): void {
    this.forget(id);
    if (!(tree.weight > 0) || !(tree.hM > this.#breastHeightM) || !(tree.dCm > 0)) return;
    this.#taught.set(id, tree);
    this.#model.set(id, { plot: tree.plotId, x: this.#x(tree.dCm), y: Math.log(tree.hM - this.#breastHeightM), weight: tree.weight });
    if (tree.weight > LEAST_WEIGHT) this.#diameters.add(tree.dCm);
  }

  forget(id: string): void {
    const tree = this.#taught.get(id);
    if (!tree) return;
    this.#taught.delete(id);
    this.#model.remove(id);
    if (tree.weight > LEAST_WEIGHT) this.#diameters.remove(tree.dCm);
  }

  /** Runs `work` as if the tree had never been taught. */
  without<T>(id: string, work: () => T): T {
    const tree = this.#taught.get(id);
    if (!tree) return work();
    this.forget(id);
    try {
      return work();
    } finally {
      this.teach(id, tree);
    }
  }

  /** How far d lies outside the diameters of prior and data, as a share; 0 inside. */
  outside(dCm: number): number {
    const [least, most] = this.#diameters.around(this.#known);
    return Math.max(0, least / dCm - 1, dCm / most - 1);
  }

  /**
   * Predictive distribution of ln(h − bh) for a tree; null where there is no band. Wider outside the known diameters
   * (own choice: the scale grows by twice the share that d lies outside).
   */
  predict(plotId: string, dCm: number): Predictive | null {
    const share = this.outside(dCm);
    return share > REACH ? null : this.#wider(plotId, dCm, share);
  }

  /** As `predict`, but for any diameter: for weighing causes, where a far diameter is unlikely already. */
  predictAnywhere(plotId: string, dCm: number): Predictive | null {
    return this.#wider(plotId, dCm, Math.min(this.outside(dCm), 2));
  }

  #wider(plotId: string, dCm: number, share: number): Predictive | null {
    const predicted = this.#model.predict(plotId, this.#x(dCm));
    return predicted && { ...predicted, scale: predicted.scale * (1 + 2 * share) };
  }

  /** Heights between which the share `level` of trees of this diameter should lie, with the median; m. */
  interval(plotId: string, dCm: number, level: number): { lowM: number; highM: number; medianM: number; widened: boolean } | null {
    const predicted = this.predict(plotId, dCm);
    if (!predicted) return null;
    const [low, high] = predictiveInterval(predicted, level);
    const bh = this.#breastHeightM;
    return { lowM: bh + Math.exp(low), highM: bh + Math.exp(high), medianM: bh + Math.exp(predicted.location), widened: this.outside(dCm) > 0 };
  }

  /**
   * Diameters, cm, at which this height would be no surprise: from the smallest to the largest whose tail probability is at
   * least `rate`, among those for which there is a band. Null where there is none.
   */
  diametersFor(plotId: string, hM: number, rate: number): readonly [number, number] | null {
    const fits = (logD: number) => (this.tail(plotId, Math.exp(logD), hM) ?? 0) >= rate;
    const [least, most] = this.#diameters.around(this.#known);
    const [from, to] = [Math.log(least / (1 + REACH)), Math.log(most * (1 + REACH))];
    const grid = Array.from({ length: GRID + 1 }, (_, i) => from + ((to - from) * i) / GRID);
    const first = grid.findIndex(fits);
    if (first < 0) return null;
    const last = grid.findLastIndex(fits);
    const edge = (inside: number, outside: number | undefined) => {
      if (outside === undefined) return inside;
      let [good, bad] = [inside, outside];
      for (let i = 0; i < 14; i++) {
        const middle = (good + bad) / 2;
        if (fits(middle)) good = middle;
        else bad = middle;
      }
      return good;
    };
    return [Math.exp(edge(grid[first]!, grid[first - 1])), Math.exp(edge(grid[last]!, grid[last + 1]))];
  }

  /** Two-sided predictive tail probability of a height; null where there is no band or h is not above bh. */
  tail(plotId: string, dCm: number, hM: number): number | null {
    const predicted = this.predict(plotId, dCm);
    return predicted && hM > this.#breastHeightM ? predictiveTail(predicted, Math.log(hM - this.#breastHeightM)) : null;
  }

  /** Standardised residual of ln(h − bh); null as for `tail`. */
  residual(plotId: string, dCm: number, hM: number): number | null {
    const predicted = this.predict(plotId, dCm);
    return predicted && hM > this.#breastHeightM ? (Math.log(hM - this.#breastHeightM) - predicted.location) / predicted.scale : null;
  }
}
