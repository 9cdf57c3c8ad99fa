/**
 * A number as an unevaluated sum of two doubles (double-double): sums keep about 32 digits, so that what is added and
 * later taken away leaves nothing behind. Source: Dekker 1971, Numer. Math. 18:224; Knuth, TAOCP 2, 4.2.2 (two-sum).
 */
export type Exact = { hi: number; lo: number };

export const zero = (): Exact => ({ hi: 0, lo: 0 });

function renew(sum: Exact, hi: number, lo: number): void {
  const total = hi + lo;
  sum.lo = lo - (total - hi);
  sum.hi = total;
}

/** Adds a double to the sum. */
export function add(sum: Exact, value: number): void {
  const total = sum.hi + value;
  const part = total - sum.hi;
  const error = sum.hi - (total - part) + (value - part);
  renew(sum, total, sum.lo + error);
}

/** Adds a·b to the sum, with the rounding error of the product. */
export function addProduct(sum: Exact, a: number, b: number): void {
  const product = a * b;
  const split = 134217729;
  const ca = split * a; const aHi = ca - (ca - a); const aLo = a - aHi;
  const cb = split * b; const bHi = cb - (cb - b); const bLo = b - bHi;
  add(sum, product);
  add(sum, aHi * bHi - product + aHi * bLo + aLo * bHi + aLo * bLo);
}

/** What a plot's trees add up to: weights, x, y and their products. */
export type PlotSums = { n: Exact; x: Exact; y: Exact; xx: Exact; xy: Exact; yy: Exact };

export const emptyPlot = (): PlotSums => ({ n: zero(), x: zero(), y: zero(), xx: zero(), xy: zero(), yy: zero() });

/** Adds (weight > 0) or takes away (weight < 0) one tree. */
export function addTree(sums: PlotSums, x: number, y: number, weight: number): void {
  const wx = weight * x;
  const wy = weight * y;
  add(sums.n, weight);
  addProduct(sums.x, weight, x);
  addProduct(sums.y, weight, y);
  addProduct(sums.xx, wx, x);
  addProduct(sums.xy, wx, y);
  addProduct(sums.yy, wy, y);
}
