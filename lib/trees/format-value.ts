export type Rounding = 'nearest' | 'down';

/**
 * A number with a fixed count of decimals, rounded by the project's rule.
 *
 * @param value in the unit shown
 * @param decimals 0 to 6
 * @param rounding nearest (halves away from zero) or down, as some practice rounds diameters
 * @returns digits with a decimal point; throws RangeError for a value that is not finite
 * @example formatValue(12.68, 1, 'down') // '12.6'
 */
export function formatValue(value: number, decimals: number, rounding: Rounding = 'nearest', decimalSign: '.' | ',' = '.'): string {
  if (!Number.isFinite(value)) throw new RangeError('formatValue: the value is not finite');
  const factor = 10 ** decimals;
  // The smallest nudge forgives what binary fractions cost: 1.005 means 1.005.
  const scaled = value * factor;
  const nudge = Math.abs(scaled) * Number.EPSILON * 4;
  const rounded = rounding === 'down' ? Math.floor(scaled + nudge) : Math.sign(scaled) * Math.floor(Math.abs(scaled) + 0.5 + nudge);
  return (rounded / factor).toFixed(decimals).replace('.', decimalSign);
}
