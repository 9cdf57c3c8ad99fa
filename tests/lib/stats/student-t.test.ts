import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { studentTLower, studentTQuantile, studentTTwoSided, studentTUpper } from '@/lib/stats/distributions/student-t';
import { relativeError } from '../../support/relative-error';

type Table = { fn: 'pt' | 'qt'; lower_tail: boolean; log_p: boolean; args: Record<string, number[]> };
const file = JSON.parse(readFileSync(new URL('../../reference/07-distributions/student_t.json', import.meta.url), 'utf8'));
// Tables of log probabilities reach below what a double holds; the program never asks for them.
const tables = (file.inputs.tables as Table[]).map((table, t) => ({ table, values: file.expected.values[t] as number[] })).filter(({ table }) => !table.log_p);

function value({ fn, lower_tail, args }: Table, i: number): number {
  const df = args.df![i]!;
  if (fn === 'pt') return lower_tail ? studentTLower(args.q![i]!, df) : studentTUpper(args.q![i]!, df);
  return lower_tail ? studentTQuantile(args.p![i]!, df) : -studentTQuantile(args.p![i]!, df);
}

describe('Student t against R (tests/reference/07-distributions)', () => {
  it.each(tables.map((one) => ({ ...one, name: `${one.table.fn}, ${one.table.lower_tail ? 'lower' : 'upper'} tail` })))('$name agrees to 1e-9', ({ table, values }) => {
    expect(values.length).toBeGreaterThan(10);
    const worst = Math.max(...values.map((want, i) => relativeError(value(table, i), want)));
    expect(worst).toBeLessThan(1e-9);
  });

  it('gives both tails the same for either sign', () => {
    expect(studentTTwoSided(-3.1, 7)).toBe(studentTTwoSided(3.1, 7));
  });
});
