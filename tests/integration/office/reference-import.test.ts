import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { v7 } from 'uuid';
import { POST as UPLOAD } from '@/app/api/v1/projects/[projectId]/imports/route';
import { POST as PUBLISH } from '@/app/api/v1/projects/[projectId]/curves/route';
import type { HeightCurve } from '@/lib/schema/design';
import { fitCurves } from '@/lib/server/curves/fit-curves';
import { recordChanges } from '@/lib/server/log/record-changes';
import { write } from '@/lib/server/write-queue';
import { relativeError } from '../../support/relative-error';
import { makeProject, makeUser, routeContext, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer, TestUser } from '../../support/server';
import { pack, pull } from '../../support/sync';

const CHERRY = readFileSync(new URL('../../reference/black-cherry/trees.csv', import.meta.url));
type Problem = { status: number; code: string; issues: { field: string; message: string }[] };

let server: TestServer;
let analyst: TestUser;
let lead: TestUser;
let projectId: string;
let speciesId: string;
beforeAll(async () => { server = await startTestServer(); });
afterAll(() => server.close());
beforeEach(async () => {
  projectId = (await makeProject({ dbhUnit: 'in', lengthUnit: 'ft', areaUnit: 'ac', breastHeightM: 1.3716, heightDecimals: 0 })).id;
  analyst = await makeUser({ roles: { [projectId]: 'analyst' } });
  lead = await makeUser({ roles: { [projectId]: 'lead' } });
  speciesId = v7();
  const species = { id: speciesId, projectId, deleted: false, code: 'BC', localName: 'black cherry', scientificName: 'Prunus serotina', curveGroup: 'cherry', unknown: false, position: 0 };
  await write((context) => recordChanges(context, [{ entity: 'speciesEntry', recordId: speciesId, kind: 'create', values: species }], { projectId, authorId: analyst.id }));
});

async function upload(file: string | Uint8Array, over: Record<string, string> = {}, as: TestUser = analyst) {
  const form = new FormData();
  form.set('file', new File([typeof file === 'string' ? file : Uint8Array.from(file)], 'trees.csv', { type: 'text/csv' }));
  for (const [name, value] of Object.entries({ dbhUnit: 'in', lengthUnit: 'ft', dbh: 'dbh', height: 'height', defaultSpecies: 'BC', ...over })) form.set(name, value);
  const response = await UPLOAD(await signedInRequest(as, `/api/v1/projects/${projectId}/imports`, { method: 'POST', body: form }), routeContext({ projectId }));
  return { status: response.status, body: (await response.json()) as { rows: number } & Problem };
}
const stored = () => server.models.ReferenceTree.findAll({ where: { projectId }, order: ['row'] });

describe('31 black cherry trees (Ryan, Joiner and Ryan 1976) as an upload', () => {
  it('give the published curve, which travels in the work pack and in the next pull', async () => {
    expect(await upload(CHERRY, { dbh: 'Girth', height: 'Height' })).toMatchObject({ status: 200, body: { rows: 31 } });
    const [tree] = await stored();
    expect(tree).toMatchObject({ row: 2, dbhDigits: '8.3', dbhUnit: 'in', heightDigits: '70', heightUnit: 'ft', speciesId, plotLabel: null });
    expect(tree!.dbhCm).toBeCloseTo(21.082, 10);

    const before = (await pack(lead, projectId)).cursor;
    const published = await PUBLISH(await signedInRequest(analyst, `/api/v1/projects/${projectId}/curves`, {
      method: 'POST', body: JSON.stringify({ curveGroup: 'cherry', form: 'curtis' }), headers: { 'content-type': 'application/json' },
    }), routeContext({ projectId }));
    expect(published.status).toBe(200);
    const curve = (await pack(lead, projectId)).records.find(({ entity }) => entity === 'heightCurve')!.row as HeightCurve;
    // Least squares of the 31 trees, cm and m, bh 4.5 ft: computed elsewhere in double precision.
    expect(relativeError(curve.b0, 3.2945003114)).toBeLessThan(1e-9);
    expect(relativeError(curve.b1, 7.0367459933)).toBeLessThan(1e-9);
    expect(relativeError(Math.sqrt(curve.residualVariance), 0.0780726401)).toBeLessThan(1e-9);
    expect(curve).toMatchObject({ curveGroup: 'cherry', version: 1, form: 'curtis', n: 31, plots: 0, residualDf: 29, source: '31 reference trees' });
    const { changes } = await pull(lead, projectId, before);
    expect(changes.map(({ entity, recordId }) => [entity, recordId])).toEqual([['heightCurve', curve.id]]);
  });

  it('a lead may neither bring trees nor publish', async () => {
    expect((await upload(CHERRY, { dbh: 'Girth', height: 'Height' }, lead)).status).toBe(403);
    const refused = await PUBLISH(await signedInRequest(lead, `/api/v1/projects/${projectId}/curves`, {
      method: 'POST', body: JSON.stringify({ curveGroup: 'cherry', form: 'curtis' }), headers: { 'content-type': 'application/json' },
    }), routeContext({ projectId }));
    expect(refused.status).toBe(403);
    expect(await stored()).toEqual([]);
  });
});

describe('what a file may look like', () => {
  it.each([
    ['commas', 'dbh,height\n12.5,70\n'], ['semicolons with a decimal comma', 'dbh;height\n12,5;70\n'], ['tabs', 'dbh\theight\n12.5\t70\n'],
    ['a byte order mark and Windows lines', '\uFEFFdbh,height\r\n12.5,70\r\n'], ['quotes, blank lines and another case in the header', '"DBH","Height"\n\n"12.5","70"\n\n'],
  ])('%s', async (_what, text) => {
    expect((await upload(text)).status).toBe(200);
    const [tree, ...more] = await stored();
    expect(more).toEqual([]);
    expect(tree!.dbhCm).toBeCloseTo(31.75, 12);
    expect(tree!.heightM).toBeCloseTo(21.336, 12);
  });

  it('plots make a fit with plot effects; without a plot on every tree there is none', async () => {
    const rows = (plot: (i: number) => string) => `dbh,height,plot\n${Array.from({ length: 12 }, (_, i) => `${10 + i},${60 + ((i * 7) % 11)},${plot(i)}`).join('\n')}\n`;
    await upload(rows((i) => `P${i % 3}`), { plot: 'plot' });
    expect((await fitCurves(projectId))[0]!.fits.curtis).toMatchObject({ kind: 'fit', n: 12, plots: 3 });
    await upload('dbh,height,plot\n15,70,\n', { plot: 'plot' });
    expect((await fitCurves(projectId))[0]!.fits.curtis).toMatchObject({ kind: 'fit', n: 13, plots: 0 });
  });
});

describe('what is refused: all of it, with what to do, and nothing is stored', () => {
  it.each([
    ['DBH in cm', 'dbh,height\n31,70\n', { dbhUnit: 'cm' }, /dbhUnit.*in in.*in cm/, 'wrong-unit'],
    ['heights in m', 'dbh,height\n12,21\n', { lengthUnit: 'm' }, /lengthUnit.*in ft.*in m/, 'wrong-unit'],
    ['no such column', 'd,height\n12,70\n', {}, /no column "dbh" for dbh.*d, height/, 'invalid-fields'],
    ['an open quotation mark', 'dbh,height\n12,70\n"13,71\n14,72\n', {}, /line 3 and never closed/, 'invalid-fields'],
    ['an empty file', '', {}, /empty/, 'invalid-fields'],
    ['a header alone', 'dbh,height\n', {}, /no rows/, 'invalid-fields'],
    ['two columns of one name', 'dbh,dbh,height\n1,2,3\n', {}, /Two columns/, 'invalid-fields'],
    ['an unknown species', 'dbh,height,sp\n12,70,oak\n', { species: 'sp', defaultSpecies: '' }, /no species "oak".*BC/, 'invalid-fields'],
    ['a height below breast height', 'dbh,height\n12,4.5\n', {}, /not above breast height/, 'invalid-fields'],
    ['NaN', 'dbh,height\nNaN,70\n', {}, /line 2.*"NaN" is not a number/, 'invalid-fields'],
    ['a negative number', 'dbh,height\n-12,70\n', {}, /line 2.*"-12"/, 'invalid-fields'],
    ['1e308', 'dbh,height\n1e308,70\n', {}, /line 2.*"1e308"/, 'invalid-fields'],
    ['an emoji', 'dbh,height\n🌲,70\n', {}, /line 2.*"🌲"/, 'invalid-fields'],
    ['a gap', 'dbh,height\n12,\n', {}, /line 2, height.*no value/, 'invalid-fields'],
    ['a thousands sign', 'dbh;height\n1.234,5;70\n', {}, /line 2.*"1\.234,5"/, 'invalid-fields'],
  ])('%s', async (_what, text, over, message, code) => {
    const { status, body } = await upload(text, over);
    expect(status).toBe(422);
    expect(body.code).toBe(code);
    expect(body.issues.map(({ field, message: words }) => `${field}: ${words}`).join('\n')).toMatch(message);
    expect(await stored()).toEqual([]);
    expect(await server.models.ImportBatch.count({ where: { projectId } })).toBe(0);
  });

  it('every bad row is named with its own line, also after a cell of several lines', async () => {
    const { body } = await upload('dbh,height,note\n12,70,"one\ntwo"\nx,70,\n13,71,\n14,y,\n');
    expect(body.issues.map(({ field }) => field)).toEqual(['file, line 4, dbh', 'file, line 6, height']);
    expect(await stored()).toEqual([]);
  });

  it('bytes that are no UTF-8', async () => {
    const { body } = await upload(Uint8Array.from([100, 98, 104, 44, 0xff, 0xfe, 10]));
    expect(body.issues[0]!.message).toMatch(/UTF-8/);
  });

  it('a file above 20 MB', async () => {
    const { status } = await upload(new Uint8Array(20 * 1024 * 1024 + 1).fill(49));
    expect([413, 422]).toContain(status);
    expect(await stored()).toEqual([]);
  });
});
