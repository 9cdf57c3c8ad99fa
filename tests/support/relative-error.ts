/** |a − b| / |b|, or |a| where b is zero. */
export const relativeError = (a: number, b: number): number => (b === 0 ? Math.abs(a) : Math.abs(a - b) / Math.abs(b));
