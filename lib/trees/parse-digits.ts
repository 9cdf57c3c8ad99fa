import { decimalsOf } from './decimals-of';

export type ParsedDigits =
  | { readonly kind: 'value'; readonly value: number; readonly digits: string; readonly decimals: number }
  | { readonly kind: 'empty' }
  | { readonly kind: 'unfinished' }
  | { readonly kind: 'bad'; readonly reason: 'two-signs' | 'not-digits' | 'too-long' };

/**
 * Reads what a person typed as a number. Comma and point are both the decimal sign; there is no thousands sign, so
 * `12,5` is 12.5 and never 125, and `1.234,5` is refused rather than guessed at. A sign at the end is unfinished.
 *
 * @param text digits as typed, blanks around them allowed; at most 12 characters
 * @returns the value with its digits as typed, or why there is none
 * @example parseDigits('12,5') // { kind: 'value', value: 12.5, digits: '12,5', decimals: 1 }
 */
export function parseDigits(text: string): ParsedDigits {
  const digits = text.trim();
  if (digits === '') return { kind: 'empty' };
  if (digits.length > 12) return { kind: 'bad', reason: 'too-long' };
  if (!/^[0-9.,]+$/.test(digits)) return { kind: 'bad', reason: 'not-digits' };
  const signs = digits.replace(/[0-9]/g, '').length;
  if (signs > 1) return { kind: 'bad', reason: 'two-signs' };
  if (digits === '.' || digits === ',' || /[.,]$/.test(digits)) return { kind: 'unfinished' };
  return { kind: 'value', value: Number(digits.replace(',', '.')), digits, decimals: decimalsOf(digits) };
}
