import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DiameterRange } from '@/lib/checks/band/diameter-range';

const diameters = fc.array(fc.integer({ min: 40, max: 2000 }).map((tenths) => tenths / 10), { minLength: 1, maxLength: 80 });

describe('the range of diameters that taught', () => {
  it('is the smallest and largest of what was added and not removed, widened to what was known', () => {
    fc.assert(fc.property(diameters, fc.array(fc.nat(79), { maxLength: 80 }), fc.tuple(fc.constantFrom(5, 20, 90), fc.constantFrom(95, 110)), (all, away, known) => {
      const range = new DiameterRange();
      for (const d of all) range.add(d);
      const left = [...all];
      for (const i of away) {
        if (left.length === 0) break;
        const [gone] = left.splice(i % left.length, 1);
        range.remove(gone!);
      }
      expect(range.around(known)).toEqual([Math.min(known[0], ...left), Math.max(known[1], ...left)]);
    }), { seed: 20260501 });
  });

  it('is what was known when nothing has taught, and forgets nothing that was never there', () => {
    const range = new DiameterRange();
    range.remove(30);
    expect(range.around([10, 40])).toEqual([10, 40]);
    range.add(30);
    range.remove(31);
    expect(range.around([35, 40])).toEqual([30, 40]);
  });
});
