import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { v7 } from 'uuid';
import { GET } from '@/app/api/v1/projects/[projectId]/changes/route';
import type { ChangePage } from '@/lib/server/projects/list-changes';
import { recordChanges } from '@/lib/server/log/record-changes';
import { write } from '@/lib/server/write-queue';
import { makeProject, makeUser, routeContext, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer, TestUser } from '../../support/server';

describe('the change log as the analyst reads it', () => {
  let server: TestServer;
  let analyst: TestUser;
  let projectId: string;
  const stratumId = v7();

  const ask = async (query: string, as: TestUser = analyst) => {
    const response = await GET(await signedInRequest(as, `/api/v1/projects/${projectId}/changes${query}`), routeContext({ projectId }));
    return { status: response.status, page: (await response.json()) as ChangePage };
  };

  beforeAll(async () => {
    server = await startTestServer();
    projectId = (await makeProject()).id;
    analyst = await makeUser({ name: 'Ingrid Vale', roles: { [projectId]: 'analyst' } });
    const by = { projectId, authorId: analyst.id };
    const stratum = { id: stratumId, projectId, deleted: false, name: 'North slope', areaHa: 12 };
    await write((context) => recordChanges(context, [{ entity: 'stratum', recordId: stratumId, kind: 'create', values: stratum }], by));
    await write((context) => recordChanges(context, [{ entity: 'stratum', recordId: stratumId, kind: 'set', group: 'design', values: { areaHa: 14.5 } }], { ...by, reason: 'boundary surveyed again' }));
    const others = Array.from({ length: 5 }, (_, i) => ({ id: v7(), projectId, deleted: false, name: `Block ${i}`, areaHa: 1 }));
    await write((context) => recordChanges(context, others.map((values) => ({ entity: 'stratum', recordId: values.id, kind: 'create', values })), by));
  });
  afterAll(() => server.close());

  it('says of one record who changed what, from what to what, when, where and why, newest first', async () => {
    const { status, page } = await ask(`?record=${stratumId}`);
    expect(status).toBe(200);
    expect(page.before).toBeNull();
    expect(page.changes.map(({ kind }) => kind)).toEqual(['set', 'create']);
    expect(page.changes[0]).toMatchObject({ entity: 'stratum', group: 'design', author: 'Ingrid Vale', byServer: true, reason: 'boundary surveyed again', state: 'applied' });
    expect(page.changes[0]!.fields).toContainEqual({ name: 'areaHa', old: 12, new: 14.5 });
    expect(page.changes[0]!.fields).toContainEqual({ name: 'name', old: 'North slope', new: 'North slope' });
    expect(page.changes[1]!.fields).toContainEqual({ name: 'areaHa', old: null, new: 12 });
    expect(Date.parse(page.changes[0]!.wallClock)).toBeGreaterThan(Date.now() - 600_000);
  });

  it('goes through the whole project page by page without a gap or a twin', async () => {
    const cursors: number[] = [];
    let before: number | null | undefined;
    while (before !== null) {
      const { page } = await ask(`?limit=3${before === undefined ? '' : `&before=${before}`}`);
      cursors.push(...page.changes.map(({ cursor }) => cursor));
      before = page.before;
    }
    expect(cursors).toHaveLength(7);
    expect(cursors).toEqual([...new Set(cursors)].sort((a, b) => b - a));
  });

  it('is not for the crew, and holds nothing of another project', async () => {
    const crew = await makeUser({ roles: { [projectId]: 'crew' } });
    expect((await ask('', crew)).status).toBe(403);
    const other = await makeProject();
    const elsewhere = await makeUser({ roles: { [other.id]: 'analyst' } });
    const response = await GET(await signedInRequest(elsewhere, `/api/v1/projects/${other.id}/changes?record=${stratumId}`), routeContext({ projectId: other.id }));
    expect(((await response.json()) as ChangePage).changes).toEqual([]);
  });
});
