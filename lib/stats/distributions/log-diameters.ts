import type { Predictive } from '../mixed/plot-intercept';

/** What is believed of ln d before any tree: mean, standard deviation, and how many trees that counts for. */
export type LogDiameterPrior = { readonly mean: number; readonly sd: number; readonly worthTrees: number };

/**
 * The diameters of one species as a log-normal distribution that learns: ln d ~ N(μ, σ²) with the conjugate
 * normal-inverse-gamma prior, so that adding and removing a tree is O(1) and the next one follows Student's t.
 * Source: Gelman et al., Bayesian Data Analysis, §3.3. d in cm.
 */
export class LogDiameters {
  readonly #prior: LogDiameterPrior;
  #n = 0;
  #sum = 0;
  #squares = 0;

  /** Throws RangeError unless mean is finite and sd and worthTrees are positive. */
  constructor(prior: LogDiameterPrior) {
    if (!Number.isFinite(prior.mean) || !(prior.sd > 0) || !(prior.worthTrees > 0)) throw new RangeError('LogDiameters: no prior');
    this.#prior = prior;
  }

  add(dCm: number, weight: number): void {
    const z = Math.log(dCm) - this.#prior.mean;
    this.#n += weight;
    this.#sum += weight * z;
    this.#squares += weight * z * z;
  }

  remove(dCm: number, weight: number): void {
    this.add(dCm, -weight);
  }

  /** Predictive distribution of ln d of the next tree. */
  predict(): Predictive {
    const { mean, sd, worthTrees: k } = this.#prior;
    const total = k + this.#n;
    const centre = this.#sum / total;
    const a = (k + this.#n) / 2;
    const s = (k * sd * sd + Math.max(0, this.#squares - total * centre * centre)) / 2;
    return { location: mean + centre, scale: Math.sqrt((s / a) * (1 + 1 / total)), df: 2 * a };
  }
}
