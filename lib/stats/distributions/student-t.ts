import tCdf from '@stdlib/stats-base-dists-t-cdf';
import tLogPdf from '@stdlib/stats-base-dists-t-logpdf';
import tQuantile from '@stdlib/stats-base-dists-t-quantile';

/** P(T ≤ x) for Student's t with `df` > 0 degrees of freedom; the far lower tail is computed directly. */
export function studentTLower(x: number, df: number): number {
  return tCdf(x, df);
}

/** P(T > x), computed directly and never as 1 − P(T ≤ x). */
export function studentTUpper(x: number, df: number): number {
  return tCdf(-x, df);
}

/** P(|T| ≥ |x|): how surprising a standardised residual is on both sides. */
export function studentTTwoSided(x: number, df: number): number {
  return 2 * tCdf(-Math.abs(x), df);
}

/** The value below which Student's t falls with probability `p`, 0 < p < 1. */
export function studentTQuantile(p: number, df: number): number {
  return tQuantile(p, df);
}

/** Natural log of the density of Student's t with location 0 and scale 1. */
export function studentTLogDensity(x: number, df: number): number {
  return tLogPdf(x, df);
}
