import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalsOf } from '@/lib/trees/decimals-of';
import { formatValue } from '@/lib/trees/format-value';
import { parseDigits } from '@/lib/trees/parse-digits';
import { M2_PER_ACRE, fromCanonicalCm, fromCanonicalM, toCanonicalCm, toCanonicalM } from '@/lib/trees/units';

describe('digits as typed', () => {
  it.each([['12,5', 12.5, 1], ['12.5', 12.5, 1], ['243', 243, 0], [' 7 ', 7, 0], ['.5', 0.5, 1], [',5', 0.5, 1], ['007', 7, 0], ['0', 0, 0]])(
    '%s is read as %d', (text, value, decimals) => {
      expect(parseDigits(text)).toMatchObject({ kind: 'value', value, decimals });
    });

  it('12,5 is never 125', () => {
    expect(parseDigits('12,5')).not.toMatchObject({ value: 125 });
  });

  it.each([
    ['', { kind: 'empty' }], ['12,', { kind: 'unfinished' }], ['.', { kind: 'unfinished' }],
    ['1.234,5', { kind: 'bad', reason: 'two-signs' }], ['1,2,3', { kind: 'bad', reason: 'two-signs' }],
    ['1e3', { kind: 'bad', reason: 'not-digits' }], ['-4', { kind: 'bad', reason: 'not-digits' }], ['１２', { kind: 'bad', reason: 'not-digits' }],
    ['12 5', { kind: 'bad', reason: 'not-digits' }], ['NaN', { kind: 'bad', reason: 'not-digits' }], ['1234567890123', { kind: 'bad', reason: 'too-long' }],
  ])('%j is refused or waited for, never guessed', (text, expected) => {
    expect(parseDigits(text)).toEqual(expected);
  });

  it('point and comma always mean the same', () => {
    fc.assert(fc.property(fc.nat(9999), fc.nat(99), (whole, part) => {
      const [a, b] = [parseDigits(`${whole}.${part}`), parseDigits(`${whole},${part}`)];
      expect(a.kind === 'value' && b.kind === 'value' && a.value === b.value).toBe(true);
    }), { seed: 1 });
  });
});

describe('decimals as typed', () => {
  it.each([['12,50', 2], ['12.5', 1], ['12', 0], ['.125', 3], ['12,', 0]])('%s has %d', (digits, decimals) => {
    expect(decimalsOf(digits)).toBe(decimals);
  });
});

describe('units (exact by definition: US Federal Register 2020-21902)', () => {
  it('inch, foot and acre', () => {
    expect(toCanonicalCm(5, 'in')).toBeCloseTo(12.7, 12);
    expect(toCanonicalCm(12, 'in')).toBeCloseTo(30.48, 12);
    expect(toCanonicalM(4.5, 'ft')).toBeCloseTo(1.3716, 12);
    expect(M2_PER_ACRE).toBeCloseTo(43560 * 0.3048 ** 2, 8);
  });

  it('there and back is the same to rounding', () => {
    fc.assert(fc.property(fc.double({ min: 0.1, max: 1e4, noNaN: true }), (value) => {
      expect(fromCanonicalCm(toCanonicalCm(value, 'in'), 'in') / value).toBeCloseTo(1, 14);
      expect(fromCanonicalM(toCanonicalM(value, 'ft'), 'ft') / value).toBeCloseTo(1, 14);
    }), { seed: 2 });
  });
});

describe('values as shown', () => {
  it.each([[12.68, 1, 'nearest', '12.7'], [12.68, 1, 'down', '12.6'], [78.74, 0, 'nearest', '79'], [1.005, 2, 'nearest', '1.01'], [30, 1, 'down', '30.0'], [0.3 + 0.6, 1, 'down', '0.9']] as const)(
    '%d with %d decimals, %s, is %s', (value, decimals, rounding, shown) => {
      expect(formatValue(value, decimals, rounding)).toBe(shown);
    });

  it('takes the decimal sign of the place and refuses what is not finite', () => {
    expect(formatValue(12.5, 1, 'nearest', ',')).toBe('12,5');
    expect(() => formatValue(Number.NaN, 1)).toThrow(RangeError);
  });
});
