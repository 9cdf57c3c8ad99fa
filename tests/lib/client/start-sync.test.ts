import { IDBFactory, IDBKeyRange } from 'fake-indexeddb';
import { describe, expect, it } from 'vitest';
import { openFieldStore } from '@/lib/client/field-store';
import { startSync } from '@/lib/client/start-sync';
import { makeTransport } from '@/lib/client/transport';

const openStore = () => openFieldStore({ indexedDB: new IDBFactory(), keyRange: IDBKeyRange });
const health = () => Response.json({ ok: true, epoch: 'e' });

describe('starting sync', () => {
  it('starts at once and tells its phases and the time of the last sync', async () => {
    const handle = startSync(await openStore(), { transport: makeTransport(() => Promise.resolve(health())) });
    const phases = new Set<string>();
    handle.subscribe(({ phase }) => phases.add(phase));
    await handle.syncNow();
    expect([...phases]).toEqual(expect.arrayContaining(['probing', 'pushing', 'pulling', 'idle']));
    expect(handle.status()).toMatchObject({ phase: 'idle', unsent: 0, problem: null });
    expect(handle.status().lastSyncAt).toMatch(/^\d{4}-/);
    handle.stop();
  });

  it('another tab that holds the lock leaves this one idle without a request', async () => {
    let requests = 0;
    const transport = makeTransport(() => { requests += 1; return Promise.resolve(health()); });
    const handle = startSync(await openStore(), { transport, lock: { take: () => Promise.resolve(null) } });
    await handle.syncNow();
    expect([handle.status().phase, requests]).toEqual(['idle', 0]);
    handle.stop();
  });

  it('401 asks for signing in, and signing in goes on', async () => {
    let signedIn = false;
    const transport = makeTransport(() => Promise.resolve(signedIn ? health() : new Response(null, { status: 401 })));
    const handle = startSync(await openStore(), { transport });
    await handle.syncNow();
    expect(handle.status()).toMatchObject({ phase: 'sign-in-needed', problem: 'sign-in' });
    signedIn = true;
    await handle.signedIn();
    expect(handle.status()).toMatchObject({ phase: 'idle', problem: null });
    handle.stop();
  });
});

describe('what an answer counts as', () => {
  it.each([
    [new Response('<html></html>', { headers: { 'content-type': 'text/html' } }), 'not-ours'],
    [Response.json({ ok: true }), 'not-ours'],
    [new Response(null, { status: 302 }), 'not-ours'],
    [new Response(null, { status: 401 }), 'sign-in'],
    [new Response(null, { status: 404 }), 'denied'],
    [new Response(null, { status: 413 }), 'too-big'],
    [new Response(null, { status: 429 }), 'busy'],
    [new Response(null, { status: 507 }), 'server'],
    [new Response(null, { status: 422 }), 'refused'],
    [health(), 'ok'],
  ])('%#: %o is %s', async (response, kind) => {
    expect((await makeTransport(() => Promise.resolve(response)).probe()).kind).toBe(kind);
  });
  it('no answer is offline', async () => {
    expect((await makeTransport(() => Promise.reject(new TypeError('no route'))).probe()).kind).toBe('offline');
  });
  it('a push goes out as gzip of its JSON', async () => {
    let sent: { text: string; encoding: string | null } | null = null;
    const transport = makeTransport(async (_, init) => {
      const body = new Response(init.body).body!.pipeThrough(new DecompressionStream('gzip'));
      sent = { text: await new Response(body).text(), encoding: new Headers(init.headers).get('content-encoding') };
      return new Response(null, { status: 503 });
    });
    const request = { v: 1 as const, deviceId: 'd', epoch: null, firstSeq: 1, prevHash: '0', ops: [] };
    expect((await transport.push(request)).kind).toBe('server');
    expect(sent).toEqual({ text: JSON.stringify(request), encoding: 'gzip' });
  });
});
