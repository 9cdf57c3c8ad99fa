import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { compareReference } from '../../support/compare-reference';
import { geodesyRunners } from '../../support/geodesy-runners';
import type { Reference } from '../../support/geodesy-runners';

const folder = path.join(import.meta.dirname, '../../reference/10-geodesy');
const read = (name: string) => JSON.parse(readFileSync(path.join(folder, name), 'utf8')) as Reference;
const files = readdirSync(folder).filter((name) => name.endsWith('.json'));

describe('PROJ and GeographicLib values (tests/reference/10-geodesy)', () => {
  it('nine files are there, each of a kind that is run', () => {
    expect(files).toHaveLength(9);
    expect(files.map((name) => read(name).kind).filter((kind) => !(kind in geodesyRunners))).toEqual([]);
  });

  it.each(files)('%s: every value within the tolerance of the file', (name) => {
    const reference = read(name);
    expect(geodesyRunners[reference.kind]!(reference as never)).toEqual([]);
  });

  it('a perturbed value is caught', () => {
    const bad = compareReference({ cases: [{ easting: 385611.3 }] }, { cases: [{ easting: 385611.3002 }] }, { abs: 1e-4, rel: 0 });
    expect(bad).toHaveLength(1);
  });
});
