import { describe, expect, it } from 'vitest';
import { idSchema } from '@/lib/schema/common';
import { seededRandom } from '@/seeders/seeded-random';

const N = 20_000;
const draws = (draw: () => number) => Array.from({ length: N }, draw);
const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
const variance = (values: readonly number[]) => {
  const centre = mean(values);
  return mean(values.map((value) => (value - centre) ** 2));
};

describe('seeded random draws', () => {
  it('the same seed repeats every kind of draw; another seed, however near, does not', () => {
    const sample = (seed: string) => {
      const random = seededRandom(seed);
      return [random.uniform(), random.normal(), random.poisson(20), random.whole(1, 1000), random.pick(['a', 'b', 'c']), random.id(1_700_000_000_000)];
    };
    expect(sample('estate/1')).toEqual(sample('estate/1'));
    expect(sample('estate/1')).not.toEqual(sample('estate/2'));
  });

  // Limits are five standard errors of the mean and the variance of the distribution drawn from: a wrong distribution is far outside.
  it.each(['one', 'two', 'three'])('seed %s: moments of the uniform, normal and Poisson draws are those of their distributions', (seed) => {
    const random = seededRandom(seed);
    const uniform = draws(random.uniform);
    expect(Math.abs(mean(uniform) - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / N));
    expect(Math.abs(variance(uniform) - 1 / 12)).toBeLessThan(5 * Math.sqrt((1 / 80 - 1 / 144) / N));
    const normal = draws(random.normal);
    expect(Math.abs(mean(normal))).toBeLessThan(5 / Math.sqrt(N));
    expect(Math.abs(variance(normal) - 1)).toBeLessThan(5 * Math.sqrt(2 / N));
    const poisson = draws(() => random.poisson(22));
    expect(Math.abs(mean(poisson) - 22)).toBeLessThan(5 * Math.sqrt(22 / N));
    expect(Math.abs(variance(poisson) - 22)).toBeLessThan(5 * Math.sqrt((22 + 2 * 22 ** 2) / N));
  });

  it('ids are UUIDv7 of the time given, and all different', () => {
    const random = seededRandom('ids');
    const time = Date.UTC(2024, 8, 16, 7);
    const ids = Array.from({ length: 5000 }, () => random.id(time));
    expect(new Set(ids).size).toBe(5000);
    for (const id of ids.slice(0, 100)) {
      expect(idSchema.parse(id)).toBe(id);
      expect(Number.parseInt(id.replaceAll('-', '').slice(0, 12), 16)).toBe(time);
    }
  });
});
