import { readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

const file = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../../seeders/data/black-cherry.csv');

describe('the shipped black cherry trees', () => {
  it('are the 31 trees of Ryan, Joiner and Ryan 1976: sums 410.7 in, 2356 ft, 935.3 ft³ (data set trees of R)', () => {
    const [header, ...rows] = readFileSync(file, 'utf8').trim().split('\n').map((line) => line.split(','));
    expect(header).toEqual(['Girth', 'Height', 'Volume']);
    expect(rows).toHaveLength(31);
    const sum = (column: number) => rows.reduce((total, row) => total + Number(row[column]), 0);
    expect(sum(0)).toBeCloseTo(410.7, 9);
    expect(sum(1)).toBe(2356);
    expect(sum(2)).toBeCloseTo(935.3, 9);
  });
});
