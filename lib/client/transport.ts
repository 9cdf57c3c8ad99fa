import 'client-only';
import { z } from 'zod';
import { pullReplySchema, pushProblemSchema, pushReplySchema, workPackSchema } from '@/lib/schema/wire';
import type { Answer, Failure, Transport } from '@/lib/sync/ports';

const healthSchema = z.object({ ok: z.literal(true), epoch: z.string() });
const REQUEST_MS = 60_000;

export type Fetch = (path: string, init: RequestInit) => Promise<Response>;

function failureOf(status: number): Failure {
  if (status === 401) return 'sign-in';
  if (status === 403 || status === 404) return 'denied';
  if (status === 413) return 'too-big';
  // Too often: a smaller batch would only knock again. Waiting is what was asked for.
  if (status === 429) return 'busy';
  return status >= 500 ? 'server' : status >= 300 && status < 400 ? 'not-ours' : 'refused';
}

/** The JSON of an answer; undefined when it is something else. */
async function jsonOf(response: Response): Promise<unknown> {
  if (!/^application\/([a-z.-]+\+)?json\b/.test(response.headers.get('content-type') ?? '')) return undefined;
  return response.json().catch(() => undefined);
}

/** Compressed where the browser can; where it cannot, the server takes plain JSON as well. */
async function bodyOf(value: unknown): Promise<{ body: BodyInit; headers: Record<string, string> }> {
  const body = JSON.stringify(value);
  const headers = { 'Content-Type': 'application/json' };
  if (typeof CompressionStream === 'undefined') return { body, headers };
  const zipped = new Blob([body]).stream().pipeThrough(new CompressionStream('gzip'));
  return { body: await new Response(zipped).arrayBuffer(), headers: { ...headers, 'Content-Encoding': 'gzip' } };
}

/** Speaks to the server's sync addresses. An answer counts only when it has the whole form that the server's has. */
export function makeTransport(send: Fetch = (path, init) => fetch(path, init)): Transport {
  /** Null: no answer at all. */
  async function ask(path: string, init: RequestInit = {}): Promise<Response | null> {
    try {
      return await send(path, { cache: 'no-store', credentials: 'same-origin', redirect: 'manual', signal: AbortSignal.timeout(REQUEST_MS), ...init });
    } catch {
      return null;
    }
  }

  async function read<T>(response: Response | null, schema: z.ZodType<T>): Promise<Answer<T>> {
    if (response === null) return { kind: 'offline' };
    // A redirect that was not followed: the network's own log-in page.
    if (response.type === 'opaqueredirect') return { kind: 'not-ours' };
    if (!response.ok) return { kind: failureOf(response.status) };
    const parsed = schema.safeParse(await jsonOf(response));
    return parsed.success ? { kind: 'ok', reply: parsed.data } : { kind: 'not-ours' };
  }

  return {
    probe: async () => {
      const answer = await read(await ask('/api/health'), healthSchema);
      return answer.kind === 'ok' ? { kind: 'ok', reply: null } : answer;
    },
    push: async (request) => {
      const response = await ask('/api/sync/push', { method: 'POST', ...(await bodyOf(request)) });
      if (response?.status !== 409) return read(response, pushReplySchema);
      const problem = pushProblemSchema.safeParse(await jsonOf(response));
      return problem.success ? { kind: 'problem', problem: problem.data } : { kind: 'not-ours' };
    },
    pull: async (projectId, cursor) => {
      const answer = await read(await ask(`/api/sync/pull?project=${projectId}&cursor=${cursor}`), pullReplySchema);
      return answer.kind === 'ok' && answer.reply.projectId !== projectId ? { kind: 'not-ours' } : answer;
    },
    pack: async (projectId) => {
      const answer = await read(await ask(`/api/sync/pack?project=${projectId}`), workPackSchema);
      return answer.kind === 'ok' && answer.reply.projectId !== projectId ? { kind: 'not-ours' } : answer;
    },
  };
}
