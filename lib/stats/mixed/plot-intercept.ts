import { studentTLogDensity, studentTQuantile, studentTTwoSided } from '../distributions/student-t';
import { add, addTree, emptyPlot, zero } from './plot-sums';
import type { Exact, PlotSums } from './plot-sums';

/**
 * y = β0 + β1·x + u_plot + e with u ~ N(0, τ²σ²), e ~ N(0, σ²); β ~ N(mean, σ²·precision⁻¹), σ² ~ InvGamma(a, s).
 * `precision` is the symmetric matrix (p00, p01, p11); all zero with a = −1, s = 0 is the flat prior.
 */
export type PlotInterceptPrior = {
  readonly mean: readonly [number, number];
  readonly precision: readonly [number, number, number];
  readonly a: number;
  readonly s: number;
  readonly tauSquared: number;
};

/** A predictive Student t: (y − location)/scale has `df` degrees of freedom. */
export type Predictive = { readonly location: number; readonly scale: number; readonly df: number };

export type Posterior = {
  readonly mean: readonly [number, number];
  /** Inverse of the posterior precision, (c00, c01, c11); the covariance of β is s/a times it. */
  readonly inverse: readonly [number, number, number];
  readonly a: number;
  readonly s: number;
  /** s/a: with the flat prior the REML estimate of σ² for this τ². */
  readonly sigmaSquared: number;
};

type Tree = { readonly plot: string; readonly x: number; readonly y: number; readonly weight: number };
type Totals = { n: Exact; x: Exact; xx: Exact; y: Exact; xy: Exact; yy: Exact; weight: Exact };

/**
 * The height model of a project as it learns, one tree at a time. Only sums per plot are kept, so adding, changing or
 * removing a tree and predicting for a plot are O(1), and the order of entry does not matter.
 * Source: Gelman et al., Bayesian Data Analysis, ch. 14 (conjugate regression); Lappi 1991, For. Sci. 37:781 (plot effects);
 * Henderson 1975, Biometrics 31:423 (mixed-model equations, here solved in closed form for one plot).
 */
export class PlotInterceptModel {
  readonly #prior: PlotInterceptPrior;
  readonly #trees = new Map<string, Tree>();
  readonly #plots = new Map<string, PlotSums>();
  readonly #totals: Totals = { n: zero(), x: zero(), xx: zero(), y: zero(), xy: zero(), yy: zero(), weight: zero() };
  readonly #centre: number;
  #posterior: Posterior | null | undefined;

  /** @param centre a typical x; only the rounding of sums depends on it. Throws RangeError for a prior that is no prior. */
  constructor(prior: PlotInterceptPrior, centre = 0) {
    const [p00, p01, p11] = prior.precision;
    const numbers = [...prior.mean, p00, p01, p11, prior.a, prior.s, prior.tauSquared, centre];
    if (!numbers.every(Number.isFinite)) throw new RangeError('PlotInterceptModel: a number of the prior is not finite');
    if (!(prior.tauSquared > 0) || prior.s < 0 || p00 < 0 || p11 < 0 || p00 * p11 - p01 * p01 < -1e-9 * p00 * p11) {
      throw new RangeError('PlotInterceptModel: tau squared must be positive, s and the precision not negative');
    }
    this.#prior = prior;
    this.#centre = centre;
  }

  /** Number of trees that teach. */
  get size(): number { return this.#trees.size; }

  /** Adds a tree, or changes it when its id is known. Throws RangeError unless x, y are finite and 0 < weight ≤ 1e6. */
  set(id: string, tree: Tree): void {
    if (!Number.isFinite(tree.x) || !Number.isFinite(tree.y) || !(tree.weight > 0 && tree.weight <= 1e6)) {
      throw new RangeError('PlotInterceptModel.set: x and y must be finite and the weight positive');
    }
    this.remove(id);
    this.#trees.set(id, tree);
    this.#move(tree, 1);
  }

  /** Takes a tree away; nothing happens when it is not there. */
  remove(id: string): void {
    const tree = this.#trees.get(id);
    if (!tree) return;
    this.#trees.delete(id);
    this.#move(tree, -1);
  }

  has(id: string): boolean { return this.#trees.has(id); }

  /** The posterior of β and σ², plot effects integrated out; null while there is too little to say (flat prior). */
  posterior(): Posterior | null {
    if (this.#posterior === undefined) this.#posterior = this.#solve();
    const centred = this.#posterior;
    if (!centred) return null;
    // Back from x − centre to x: β0 = γ0 − β1·centre.
    const c = this.#centre;
    const [i00, i01, i11] = centred.inverse;
    const [m0, m1] = centred.mean;
    return {
      ...centred,
      mean: [this.#prior.mean[0] + m0 - m1 * c, this.#prior.mean[1] + m1],
      inverse: [i00 - 2 * c * i01 + c * c * i11, i01 - c * i11, i11],
    };
  }

  /** The posterior mean of a plot's effect; 0 for a plot without trees. Null as for `posterior`. */
  plotEffect(plot: string): number | null {
    return this.#plotTerms(plot)?.effect ?? null;
  }

  /** What a new tree at x in this plot should be; a plot not seen before has the spread of all plots. Null as for `posterior`. */
  predict(plot: string, x: number): Predictive | null {
    const terms = this.#plotTerms(plot);
    if (!terms) return null;
    const { posterior, k, sn, sx, effect } = terms;
    const xc = x - this.#centre;
    const w0 = 1 - k * sn;
    const w1 = xc - k * sx;
    const [i00, i01, i11] = posterior.inverse;
    const variance = 1 + w0 * w0 * i00 + 2 * w0 * w1 * i01 + w1 * w1 * i11 + k;
    const location = this.#line(x) + posterior.mean[0] + posterior.mean[1] * xc + effect;
    return { location, scale: Math.sqrt(posterior.sigmaSquared * variance), df: 2 * posterior.a };
  }

  #line(x: number): number { return this.#prior.mean[0] + this.#prior.mean[1] * x; }

  #plotTerms(plot: string) {
    if (this.#posterior === undefined) this.#posterior = this.#solve();
    const posterior = this.#posterior;
    if (!posterior) return null;
    const sums = this.#plots.get(plot);
    const sn = sums?.n.hi ?? 0;
    const sx = sums?.x.hi ?? 0;
    const k = this.#prior.tauSquared / (1 + sn * this.#prior.tauSquared);
    const effect = k * ((sums?.y.hi ?? 0) - sn * posterior.mean[0] - sx * posterior.mean[1]);
    return { posterior, k, sn, sx, effect };
  }

  /** Sums hold deviations from the prior's line, so that what is left is small and cancels little. */
  #move(tree: Tree, sign: 1 | -1): void {
    let sums = this.#plots.get(tree.plot);
    if (!sums) this.#plots.set(tree.plot, (sums = emptyPlot()));
    this.#contribute(sums, -1);
    addTree(sums, tree.x - this.#centre, tree.y - this.#line(tree.x), sign * tree.weight);
    add(this.#totals.weight, sign * tree.weight);
    this.#contribute(sums, 1);
    this.#posterior = undefined;
  }

  #contribute(sums: PlotSums, sign: 1 | -1): void {
    const tau = this.#prior.tauSquared;
    const n = sums.n.hi; const x = sums.x.hi; const y = sums.y.hi;
    const c = tau / (1 + n * tau);
    const put = (total: Exact, whole: Exact, part: number) => {
      add(total, sign * whole.hi);
      add(total, sign * whole.lo);
      add(total, -sign * part);
    };
    put(this.#totals.n, sums.n, c * n * n);
    put(this.#totals.x, sums.x, c * n * x);
    put(this.#totals.xx, sums.xx, c * x * x);
    put(this.#totals.y, sums.y, c * n * y);
    put(this.#totals.xy, sums.xy, c * x * y);
    put(this.#totals.yy, sums.yy, c * y * y);
  }

  /** Λ and r for x − centre and y minus the prior's line; the prior mean is then zero. */
  #solve(): Posterior | null {
    const [p00, p01, p11] = this.#prior.precision;
    const c = this.#centre;
    const t = this.#totals;
    // The prior's precision in terms of (γ0, β1) with γ0 = β0 + β1·centre.
    const l00 = p00 + t.n.hi;
    const l01 = p01 - c * p00 + t.x.hi;
    const l11 = p11 - 2 * c * p01 + c * c * p00 + t.xx.hi;
    const determinant = l00 * l11 - l01 * l01;
    const a = this.#prior.a + t.weight.hi / 2;
    if (!(determinant > 1e-12 * l00 * l11) || !(a > 0)) return null;
    const inverse = [l11 / determinant, -l01 / determinant, l00 / determinant] as const;
    const m0 = inverse[0] * t.y.hi + inverse[1] * t.xy.hi;
    const m1 = inverse[1] * t.y.hi + inverse[2] * t.xy.hi;
    const s = this.#prior.s + Math.max(0, t.yy.hi - m0 * t.y.hi - m1 * t.xy.hi) / 2;
    if (!(s > 0)) return null;
    return { mean: [m0, m1], inverse, a, s, sigmaSquared: s / a };
  }
}

/** The interval in which `level` (0 to 1) of the predictive distribution lies, on the scale of y. */
export function predictiveInterval({ location, scale, df }: Predictive, level: number): readonly [number, number] {
  const t = studentTQuantile((1 - level) / 2, df);
  return [location + t * scale, location - t * scale];
}

/** Probability of a value at least as far from the middle as y, on both sides. */
export function predictiveTail({ location, scale, df }: Predictive, y: number): number {
  return studentTTwoSided((y - location) / scale, df);
}

/** Natural log of the predictive density at y. */
export function predictiveLogDensity({ location, scale, df }: Predictive, y: number): number {
  return studentTLogDensity((y - location) / scale, df) - Math.log(scale);
}
