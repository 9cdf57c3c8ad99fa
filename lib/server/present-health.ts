import 'server-only';
import { openDatabase } from '@/models';
import { LATEST_MIGRATION } from '@/models/migrations';
import { serverEpoch } from './database';
import { problemResponse, Problem } from './errors';

export type Health = { readonly ok: true; readonly database: 'ok'; readonly schema: number; readonly epoch: string };

/** Whether the server can read its database; 503 when it cannot. Says nothing that a stranger may not know. */
export async function readHealth(): Promise<Health | Response> {
  try {
    await openDatabase();
    return { ok: true, database: 'ok', schema: LATEST_MIGRATION, epoch: await serverEpoch() };
  } catch (error) {
    console.error('[health] the database cannot be read', error);
    return problemResponse(new Problem('store-unavailable', { detail: 'The database cannot be read.', members: { database: 'failed' } }));
  }
}
