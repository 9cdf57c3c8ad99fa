import { IDBFactory, IDBKeyRange } from 'fake-indexeddb';
import { GET as health } from '@/app/api/health/route';
import { GET as getPack } from '@/app/api/sync/pack/route';
import { GET as getPull } from '@/app/api/sync/pull/route';
import { POST as postPush } from '@/app/api/sync/push/route';
import { openFieldStore, syncStoreOf } from '@/lib/client/field-store';
import { makeTransport } from '@/lib/client/transport';
import type { Fetch } from '@/lib/client/transport';
import { entityNames } from '@/lib/schema/entities';
import { sessionCookie } from '@/lib/server/auth';
import { startSession } from '@/lib/server/session';
import { SyncEngine } from '@/lib/sync/engine';
import { TEST_ORIGIN, routeContext } from './server';
import type { TestUser } from './server';

const handlers: Readonly<Record<string, (request: Request, context: ReturnType<typeof routeContext>) => Promise<Response>>> = {
  'GET /api/health': health, 'GET /api/sync/pack': getPack, 'GET /api/sync/pull': getPull, 'POST /api/sync/push': postPush,
};

/** What a network does to a request; the usual one hands it to the server. */
export type Network = (path: string, deliver: () => Promise<Response>) => Promise<Response>;

/** A phone with a store of its own, signed in as a person, whose requests reach the server's real handlers. */
export async function makeFieldDevice(user: Pick<TestUser, 'id'>, indexedDB = new IDBFactory()) {
  const cookie = await sessionCookie(await startSession(user.id));
  const network: { now: Network } = { now: (_, deliver) => deliver() };
  const send: Fetch = (path, init) => network.now(path, () => {
    const headers = new Headers(init.headers);
    headers.set('cookie', cookie);
    headers.set('origin', TEST_ORIGIN);
    const url = new URL(path, TEST_ORIGIN);
    return handlers[`${init.method ?? 'GET'} ${url.pathname}`]!(new Request(url, { ...init, headers }), routeContext());
  });
  const store = await openFieldStore({ indexedDB, keyRange: IDBKeyRange });
  const transport = makeTransport(send);
  const log: string[] = [];
  const engine = new SyncEngine({
    store: syncStoreOf(store), transport, lock: { take: () => Promise.resolve(() => undefined) }, later: () => () => undefined, random: () => 0.5,
    report: () => undefined, log: (what) => { log.push(what); },
  });
  return {
    store, network, engine, log, indexedDB,
    sync: () => engine.send({ kind: 'wanted' }),
    fetchPack: async (projectId: string) => {
      const answer = await transport.pack(projectId);
      if (answer.kind !== 'ok') throw new Error(answer.kind);
      await store.savePack(answer.reply);
    },
    /** Everything that a person on this phone can see of a project, in a fixed order. */
    view: async (projectId: string) => {
      const lists = await Promise.all(entityNames.map((entity) => store.list(projectId, entity)));
      return lists.flat().sort((a, b) => (a.id < b.id ? -1 : 1));
    },
  };
}
export type FieldDevice = Awaited<ReturnType<typeof makeFieldDevice>>;
