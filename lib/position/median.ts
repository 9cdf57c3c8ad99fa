/** Middle value; of an even count, the mean of the two in the middle. Throws RangeError for an empty list. */
export function median(values: readonly number[]): number {
  if (values.length === 0) throw new RangeError('median: no values');
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}
