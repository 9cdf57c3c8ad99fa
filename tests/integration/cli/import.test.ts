import { spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { IMPORT_USAGE } from '@/lib/cli/import/parse-import-arguments';
import { runImport } from '@/lib/cli/import/run-import';
import type { ImportArguments } from '@/lib/cli/import/parse-import-arguments';
import { seedDemo } from '@/seeders/seed-demo';
import { freshDatabase } from '../../support/server-database';

let database: Awaited<ReturnType<typeof freshDatabase>>;
beforeAll(async () => {
  database = await freshDatabase();
  await seedDemo();
});
afterAll(async () => database.close());

const cherry: ImportArguments = {
  project: 'dunmorrow tract', file: 'f.csv', dbhUnit: 'in', lengthUnit: 'ft', columns: { dbh: 'd', height: 'h', species: null, plot: null },
  speciesName: 'black cherry', publish: false, form: null, note: '', by: null,
};
const csv = (text: string) => ({ fileName: 'f.csv', bytes: new TextEncoder().encode(text) });
const trees = () => database.models.ReferenceTree.count();

describe('npm run import', () => {
  it('takes a file whole, as the first administrator, and says how many trees', async () => {
    const before = await trees();
    const report = await runImport(cherry, csv('d,h\n14.2,71\n9.8,63\n'));
    expect(report.lines.join('\n')).toMatch(/2 trees/);
    expect(report.ok).toBe(true);
    expect(await trees()).toBe(before + 2);
  });

  it('units that are not the project’s are refused, naming field and both units; nothing is converted or stored', async () => {
    const before = await trees();
    const report = await runImport({ ...cherry, dbhUnit: 'cm', lengthUnit: 'm' }, csv('d,h\n36,21.5\n'));
    expect(report.ok).toBe(false);
    expect(report.lines.join('\n')).toMatch(/--dbh-unit: .*in in, not in cm[\s\S]*--height-unit: .*in ft, not in m/);
    expect(await trees()).toBe(before);
  });

  it('bad rows are listed with their line and nothing of the file is taken', async () => {
    const before = await trees();
    const report = await runImport(cherry, csv('d,h\n14.2,71\nabc,70\n12.1,\n'));
    expect(report.ok).toBe(false);
    const text = report.lines.join('\n');
    expect(text).toMatch(/line 3\b/);
    expect(text).toMatch(/line 4\b/);
    expect(await trees()).toBe(before);
  });

  it('an unknown project is refused with the names there are', async () => {
    const report = await runImport({ ...cherry, project: 'Nowhere' }, csv('d,h\n1,2\n'));
    expect(report.ok).toBe(false);
    expect(report.lines.join('\n')).toMatch(/no project "Nowhere"[\s\S]*Dunmorrow tract[\s\S]*Velmarrow estate/);
  });

  it('--publish fits the curve anew with the form asked for, as the next version', async () => {
    const project = await database.models.Project.findOne({ where: { name: 'Dunmorrow tract' } });
    const report = await runImport({ ...cherry, publish: true, form: 'wykoff' }, csv('d,h\n15.5,77\n'));
    expect(report.ok).toBe(true);
    const versions = await database.models.HeightCurve.findAll({ where: { projectId: project!.id, curveGroup: 'black cherry' }, order: ['version'] });
    expect(versions.map(({ form }) => form)).toEqual(['curtis', 'wykoff']);
  });

  it('as a command: 2 and the usage when units are not stated, 1 when the file is not there', () => {
    const run = (...args: string[]) => spawnSync(process.execPath, ['node_modules/tsx/dist/cli.mjs', '--conditions=react-server', 'lib/cli/import.ts', ...args], { encoding: 'utf8' });
    const usage = run('--project', 'x', 'f.csv', '--species-name', 'y');
    expect(usage.status).toBe(2);
    expect(usage.stderr).toContain(IMPORT_USAGE);
    const file = path.join(database.folder, 'none.csv');
    const missing = run('--project', 'x', file, '--species-name', 'y', '--dbh-unit', 'cm', '--height-unit', 'm');
    expect(missing.status).toBe(1);
    expect(missing.stderr).toContain(file);
    writeFileSync(file, 'd,h\n10,60\n');
    const taken = run('--project', 'Dunmorrow tract', file, '--dbh', 'd', '--height', 'h', '--species-name', 'black cherry', '--dbh-unit', 'in', '--height-unit', 'ft');
    expect(taken.stderr).toBe('');
    expect(taken.status).toBe(0);
  });
});
