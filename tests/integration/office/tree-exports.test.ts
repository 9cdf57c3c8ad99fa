import Papa from 'papaparse';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { v7 } from 'uuid';
import { GET as CSV } from '@/app/api/v1/projects/[projectId]/trees.csv/route';
import { GET as TREES } from '@/app/api/v1/projects/[projectId]/trees/route';
import { GET as LOOKS } from '@/app/api/v1/projects/[projectId]/second-looks/route';
import { GET as VISIT } from '@/app/api/v1/projects/[projectId]/visits/[visitId]/route';
import { GET as DICTIONARY } from '@/app/api/v1/projects/[projectId]/dictionary/route';
import { GET as QUARANTINE } from '@/app/api/v1/projects/[projectId]/quarantine/route';
import type { SecondLook } from '@/lib/schema/field';
import type { RecordChange } from '@/lib/schema/record-change';
import { recordChanges } from '@/lib/server/log/record-changes';
import type { RouteHandler } from '@/lib/server/route';
import { write } from '@/lib/server/write-queue';
import { treeChanges } from '../../support/field-records';
import { routeContext, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';
import { makeSyncProject, makeWireDevice, push } from '../../support/sync';
import type { SyncProject } from '../../support/sync';

type Row = Record<string, string | number | null>;
type Page = { total: number; columns: { name: string }[]; rows: Row[] };

let server: TestServer;
let there: SyncProject;
let first: ReturnType<typeof treeChanges>;
let second: ReturnType<typeof treeChanges>;

const ask = async (handler: RouteHandler, query = '', params: Record<string, string> = {}) =>
  handler(await signedInRequest(there.analyst, `/api/v1/x${query}`), routeContext({ projectId: there.project.id, ...params }));
const page = async (query = '') => (await (await ask(TREES, query)).json()) as Page;

const changesOf = (list: readonly RecordChange[], entity: string) => list.find((change) => change.entity === entity)!.recordId;
function look(values: Partial<SecondLook>): RecordChange {
  const id = v7();
  const doubt: SecondLook = {
    id, projectId: there.project.id, deleted: false, visitId: changesOf(first.changes, 'visit'), measurementId: first.measurementId, readingId: null, rule: 'height-band', moment: 'tape',
    level: 'look', quantity: 'height', enteredDigits: '45', enteredCanonical: 45, expectedLow: 18.71234, expectedHigh: 31.2, tailProbability: 0.001, cause: null, causeProbability: null,
    suggestedQuantity: null, suggestedDigits: null, raisedBy: 'device', raisedAt: '2026-06-01T08:02:00.000Z', answer: 'open', reason: null, answerNote: '', answeredById: null,
    answeredAt: null, answerReadingId: null, ...values,
  };
  return { entity: 'secondLook', recordId: id, kind: 'create', values: doubt };
}

beforeAll(async () => {
  server = await startTestServer();
  there = await makeSyncProject();
  first = treeChanges(there, '1', 31.5);
  second = treeChanges(there, '=2+3', 0.1234567891);
  const by = { projectId: there.project.id, authorId: there.crew.id };
  await write((context) => recordChanges(context, [...first.changes, ...second.changes], by));
  await write((context) => recordChanges(context, [
    look({ cause: 'height-other-unit', causeProbability: 0.9, suggestedQuantity: 'height', suggestedDigits: '13.7' }),
    look({ answer: 'accepted', reason: 'suppressed', answerNote: 'said, "leave it"', answeredById: there.crew.id, answeredAt: '2026-06-01T08:05:00.000Z', raisedAt: '2026-06-01T08:03:00.000Z' }),
    look({ level: 'quiet' }),
    { entity: 'stemMeasurement', recordId: second.measurementId, kind: 'set', group: 'remarks', values: { remarks: '＝HYPERLINK("x")' } },
  ], by));
});
afterAll(() => server.close());

describe('the tree table', () => {
  it('carries each doubt of a stem with its answer', async () => {
    const { total, rows } = await page();
    expect(total).toBe(2);
    expect(rows.find(({ tag }) => tag === '1')).toMatchObject({
      plot: '12', stratum: 'Upper slope', dbh_digits: '31.5', dbh_unit: 'cm', dbh_cm: 31.5, height_m: null, readings: 1, looks: 2, open_looks: 1, quiet_marks: 1,
      rules: 'height-band|height-band', causes: 'height-other-unit|', suggested: 'height 13.7|', answers: 'open|accepted', reasons: '|suppressed: said, "leave it"', two_values: 0,
      measured_by: 'Odd Lien', recorded_by: 'Odd Lien',
    });
  });

  it('is the same in CSV: numbers stay numbers to the last bit, and no text can run as a formula', async () => {
    const response = await ask(CSV);
    expect(response.headers.get('content-disposition')).toMatch(/^attachment; filename="[\w.-]+\.csv"$/);
    const text = await response.text();
    expect(text).toMatch(/\r\n$/);
    const { data, errors } = Papa.parse<Record<string, string>>(text.trim(), { header: true });
    expect(errors).toEqual([]);
    const { rows, columns } = await page();
    expect(Object.keys(data[0]!)).toEqual(columns.map(({ name }) => name));
    const odd = data.find(({ measurement_id: id }) => id === second.measurementId)!;
    expect([odd.tag, odd.remarks]).toEqual(["'=2+3", '\'＝HYPERLINK("x")']);
    expect(Number(odd.dbh_cm)).toBe(0.1234567891);
    const plain = data.find(({ tag }) => tag === '1')!;
    const json = rows.find(({ tag }) => tag === '1')!;
    for (const { name } of columns) expect(plain[name]).toBe(json[name] === null || json[name] === undefined ? '' : String(json[name]));
  });

  it('narrows by doubts, plot, species, stratum and kind of visit, and pages', async () => {
    const counts = async (...queries: string[]) => Promise.all(queries.map(async (query) => (await page(query)).total));
    expect(await counts('?doubts=any', '?doubts=open', '?plot=12', '?plot=13', `?species=${there.species.id}`, `?species=${v7()}`, `?stratum=${there.stratum.id}`, '?kind=blind', '?kind=production')).toEqual([1, 1, 2, 0, 2, 0, 2, 0, 2]);
    const pages = await Promise.all(['?limit=1', '?limit=1&offset=1', '?limit=1&offset=2'].map(page));
    expect(pages.map(({ rows }) => rows.length)).toEqual([1, 1, 0]);
    expect(new Set(pages.flatMap(({ rows }) => rows.map(({ measurement_id: id }) => id))).size).toBe(2);
    expect((await ask(TREES, '?doubts=some')).status).toBe(422);
  });

  it('leaves out what was deleted', async () => {
    const gone = treeChanges(there, '9', 20);
    const by = { projectId: there.project.id, authorId: there.crew.id };
    await write((context) => recordChanges(context, gone.changes, by));
    expect((await page()).total).toBe(3);
    await write((context) => recordChanges(context, [{ entity: 'stemMeasurement', recordId: gone.measurementId, kind: 'delete' }], by));
    expect((await page()).total).toBe(2);
  });

  it('every column has a line in the dictionary', async () => {
    const { columns } = (await (await ask(DICTIONARY)).json()) as { columns: Row[] };
    expect(columns.filter(({ table }) => table === 'trees').map(({ column }) => column)).toEqual((await page()).columns.map(({ name }) => name));
    expect(columns.every(({ meaning }) => typeof meaning === 'string' && meaning.length > 5)).toBe(true);
  });
});

describe('second looks and visits', () => {
  it('limits stand in the unit of the project', async () => {
    const { rows } = (await (await ask(LOOKS)).json()) as { rows: Row[] };
    expect(rows).toHaveLength(3);
    expect(rows[0]).toMatchObject({ plot: '12', tag: '1', entered: '45', expected_low: 18.7123, expected_high: 31.2, answer: 'open' });
    expect(rows.find(({ answer }) => answer === 'accepted')).toMatchObject({ reason: 'suppressed', answered_by: 'Odd Lien' });
  });

  it('one visit shows readings and looks, and only to its own project', async () => {
    const visitId = changesOf(first.changes, 'visit');
    const detail = (await (await ask(VISIT, '', { visitId })).json()) as { stems: { tag: string; readings: { digits: string; measurer: string }[]; looks: unknown[] }[] };
    expect(detail.stems).toHaveLength(1);
    expect(detail.stems[0]).toMatchObject({ tag: '1', readings: [{ digits: '31.5', measurer: 'Odd Lien' }] });
    expect(detail.stems[0]!.looks).toHaveLength(3);
    const elsewhere = await makeSyncProject();
    const response = await VISIT(await signedInRequest(elsewhere.analyst, '/api/v1/x'), routeContext({ projectId: elsewhere.project.id, visitId }));
    expect(response.status).toBe(404);
  });

  it('what could not be applied is listed word for word, with the reason', async () => {
    const phone = makeWireDevice(there.project.id, there.crew.id);
    phone.make({ entity: 'reading', recordId: v7(), kind: 'create', group: '*', values: { measurementId: first.measurementId, quantity: 'dbh', digits: '12', unit: 'in', canonical: 30.48, origin: 'first', instrument: null, measurerId: null, recorderId: null, takenAt: '2026-06-01T09:00:00.000Z' } });
    expect((await push(there.crew, phone.request())).quarantined).toHaveLength(1);
    const { operations } = (await (await ask(QUARANTINE)).json()) as { operations: { opId: string; reason: string; raw: string; author: string }[] };
    expect(operations).toHaveLength(1);
    expect(operations[0]).toMatchObject({ opId: phone.made[0]!.opId, author: 'Odd Lien' });
    expect(operations[0]!.reason).toMatch(/unit.*\bin\b/);
    expect(JSON.parse(operations[0]!.raw)).toEqual(phone.made[0]);
  });
});
