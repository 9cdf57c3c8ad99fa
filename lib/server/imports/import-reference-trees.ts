import 'server-only';
import { createHash } from 'node:crypto';
import { v7 } from 'uuid';
import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import { parseDigits } from '@/lib/trees/parse-digits';
import { toCanonicalCm, toCanonicalM } from '@/lib/trees/units';
import { openDatabase } from '@/models';
import type { Models } from '@/models';
import type { ReferenceTreeRow } from '@/models/reference-tree';
import { upsertRows } from '../upsert-rows';
import { write } from '../write-queue';
import { readTable } from './read-table';
import type { TableIssue, TableRow } from './read-table';

export type ImportColumns = { readonly dbh: string; readonly height: string; readonly species?: string; readonly plot?: string };
export type ReferenceImport = {
  readonly projectId: string;
  readonly authorId: string;
  readonly fileName: string;
  readonly bytes: Uint8Array;
  readonly columns: ImportColumns;
  /** Code or name of the species of every row, where the file has no column for it. */
  readonly defaultSpecies?: string;
  readonly dbhUnit: DbhUnit;
  readonly lengthUnit: LengthUnit;
  readonly note?: string;
};
export type ReferenceImportResult =
  | { readonly ok: true; readonly batchId: string; readonly rows: number; readonly speciesIds: readonly string[] }
  | { readonly ok: false; readonly issues: readonly TableIssue[] };

const MOST_ISSUES = 1000;
/** What a conversion may cost: 4.5 ft is breast height, not a hair above it. */
const ROUNDING_M = 1e-9;
const same = (a: string, b: string): boolean => a.trim().toLowerCase() === b.trim().toLowerCase();

type Facts = { readonly breastHeightM: number; readonly species: (name: string) => string | null; readonly speciesNames: string };

function readRow({ line, cells }: TableRow, given: ReferenceImport, facts: Facts, issues: TableIssue[]): Omit<ReferenceTreeRow, 'id' | 'batchId'> | null {
  const { columns, dbhUnit, lengthUnit } = given;
  const before = issues.length;
  const problem = (column: string, message: string) => { issues.push({ row: line, column, message: `${column}: ${message}` }); };
  const number = (column: string, unit: string) => {
    const text = cells[column] ?? '';
    const parsed = parseDigits(text);
    if (parsed.kind === 'value' && parsed.value > 0) return parsed;
    problem(column, parsed.kind === 'empty' ? `there is no value; write one in ${unit} or take the row out.`
      : `"${text.slice(0, 40)}" is not a number above zero in ${unit}; write digits with one decimal sign at most.`);
    return null;
  };
  const dbh = number(columns.dbh, dbhUnit);
  const height = number(columns.height, lengthUnit);
  const heightM = height && toCanonicalM(height.value, lengthUnit);
  if (heightM !== null && heightM <= facts.breastHeightM + ROUNDING_M) problem(columns.height, `${height?.digits} ${lengthUnit} is not above breast height.`);
  const named = columns.species === undefined ? given.defaultSpecies ?? '' : cells[columns.species] ?? '';
  const speciesId = facts.species(named);
  if (speciesId === null) problem(columns.species ?? 'species', `the project has no species "${named.slice(0, 60)}". It has: ${facts.speciesNames}.`);
  if (!dbh || !height || heightM === null || speciesId === null || issues.length > before) return null;
  return {
    projectId: given.projectId, row: line, speciesId, plotLabel: columns.plot === undefined ? null : cells[columns.plot] || null,
    dbhDigits: dbh.digits, dbhUnit, dbhCm: toCanonicalCm(dbh.value, dbhUnit), heightDigits: height.digits, heightUnit: lengthUnit, heightM,
  };
}

async function speciesOf(models: Models, projectId: string): Promise<Pick<Facts, 'species' | 'speciesNames'>> {
  const entries = await models.SpeciesEntry.findAll({ where: { projectId, deleted: false }, order: ['position'] });
  const known = new Map(entries.flatMap(({ id, code, localName, scientificName }) =>
    [code, localName, scientificName].filter(Boolean).map((name) => [name.trim().toLowerCase(), id] as const)));
  return { species: (name) => known.get(name.trim().toLowerCase()) ?? null, speciesNames: entries.map(({ code, localName }) => `${code} (${localName})`).join(', ') };
}

/**
 * Takes reference trees from a CSV file into a project: all rows or none. The stated units must be those that the project
 * has locked; nothing is converted that was not stated. Digits stay as written, beside canonical cm and m.
 *
 * @returns the batch with its rows, or every fault with its line, column and what to do
 */
export async function importReferenceTrees(given: ReferenceImport): Promise<ReferenceImportResult> {
  const { models } = await openDatabase();
  const project = await models.Project.findByPk(given.projectId);
  if (!project) return { ok: false, issues: [{ row: null, column: null, message: 'There is no such project.' }] };
  const { dbhUnit, lengthUnit, breastHeightM } = project;
  const foreign: TableIssue[] = [
    ...(given.dbhUnit === dbhUnit ? [] : [{ row: null, column: 'dbhUnit', message: `dbhUnit: this project measures DBH in ${dbhUnit}, the file is stated in ${given.dbhUnit}. Nothing is converted; bring the file in ${dbhUnit}.` }]),
    ...(given.lengthUnit === lengthUnit ? [] : [{ row: null, column: 'lengthUnit', message: `lengthUnit: this project measures heights in ${lengthUnit}, the file is stated in ${given.lengthUnit}. Nothing is converted; bring the file in ${lengthUnit}.` }]),
  ];
  if (foreign.length > 0) return { ok: false, issues: foreign };
  const table = readTable(given.bytes);
  if (!table.ok) return table;
  const columns = { ...given.columns };
  const missing: TableIssue[] = [];
  for (const [role, name] of Object.entries(columns) as [keyof ImportColumns, string][]) {
    const found = table.header.find((column) => same(column, name));
    if (found === undefined) missing.push({ row: 1, column: name, message: `There is no column "${name}" for ${role}. The file has: ${table.header.join(', ')}.` });
    else columns[role] = found;
  }
  if (columns.species === undefined && given.defaultSpecies === undefined) missing.push({ row: 1, column: 'species', message: 'Say which column holds the species, or name the one species of all rows.' });
  if (missing.length > 0) return { ok: false, issues: missing };

  const facts: Facts = { breastHeightM, ...(await speciesOf(models, given.projectId)) };
  const issues: TableIssue[] = [];
  const trees = table.rows.flatMap((row) => (issues.length < MOST_ISSUES ? readRow(row, { ...given, columns }, facts, issues) ?? [] : []));
  if (issues.length >= MOST_ISSUES) issues.push({ row: null, column: null, message: `There are more faults; the first ${MOST_ISSUES} are listed.` });
  if (issues.length > 0) return { ok: false, issues };

  const batchId = v7();
  await write(async ({ models: stored, transaction }) => {
    await stored.ImportBatch.create({
      id: batchId, projectId: given.projectId, fileName: given.fileName.slice(0, 200), sha256: createHash('sha256').update(given.bytes).digest('hex'),
      rows: trees.length, dbhUnit, lengthUnit, importedById: given.authorId, importedAt: new Date().toISOString(), note: given.note ?? '',
    }, { transaction });
    await upsertRows(stored.ReferenceTree, trees.map((tree) => ({ ...tree, id: v7(), batchId })), transaction);
  });
  return { ok: true, batchId, rows: trees.length, speciesIds: [...new Set(trees.map(({ speciesId }) => speciesId))] };
}
