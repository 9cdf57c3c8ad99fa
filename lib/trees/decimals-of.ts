/**
 * How many decimals digits have, as typed.
 *
 * @param digits with a comma or a point, or neither
 * @example decimalsOf('12,50') // 2
 */
export function decimalsOf(digits: string): number {
  const [, after = ''] = digits.split(/[.,]/);
  return after.length;
}
