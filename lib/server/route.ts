import 'server-only';
import { z } from 'zod';
import { openDatabase } from '@/models';
import { getUser } from './auth';
import { Problem, asProblem, problemResponse, problems } from './errors';
import { can, mayKnow } from './policies';
import type { Action, SignedIn } from './policies';
import { contentFaults, onlyOnce, readForm, readJson, requireOwnOrigin } from './route-request';

const none = z.strictObject({});
type None = typeof none;

export type RouteInput<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> = {
  readonly params: z.output<P>;
  readonly query: z.output<Q>;
  readonly body: z.output<B>;
};

/** Those whom the policy lets do `action` in the project that the input names. */
type ProjectAccess<Input> = { readonly action: Action; readonly project: (input: Input) => string };
/** Those whom the policy lets do `action` on the server as a whole. */
type ServerAccess = { readonly action: Action; readonly project: 'server' };

/** Who may call. */
export type Access<Input> = 'public' | 'signed-in' | ProjectAccess<Input> | ServerAccess;

export type RouteOptions<A, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> = {
  readonly access: A;
  readonly params?: P;
  readonly query?: Q;
  /** Without one, no body is read. A request that changes something needs none (DELETE) or JSON, gzip or a form. */
  readonly body?: B;
  /** json (the default): JSON, plain or gzip. form: multipart; the schema sees text and File values. */
  readonly bodyKind?: 'json' | 'form';
  /** Largest body in bytes, as sent and inflated. Default 1 MiB. */
  readonly maxBodyBytes?: number;
  /** Only for pushed operations, which are kept verbatim: neither names nor depth are looked at. */
  readonly verbatim?: boolean;
  /** What the answer must be; parsed, so that nothing else leaves. */
  readonly reply?: z.ZodType;
};

export type RouteCall<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType, User, ProjectId> = RouteInput<P, Q, B> & {
  readonly user: User;
  readonly request: Request;
  /** The project that the caller was let into; null where access names none. */
  readonly projectId: ProjectId;
};

/** Next hands over no params to a route whose address has none. */
type NextContext = { readonly params: Promise<Record<string, string | string[] | undefined> | undefined> };
export type RouteHandler = ((request: Request, context: NextContext) => Promise<Response>) & {
  /** Read by the test of the authorisation matrix. */
  readonly access: 'public' | 'signed-in' | Action;
};

const CHANGING = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);
const MIB = 1024 * 1024;

const apiHeaders: Readonly<Record<string, string>> = {
  'Cache-Control': 'private, no-store',
  'Content-Security-Policy': "default-src 'none'; frame-ancestors 'none'; sandbox",
  'Cross-Origin-Resource-Policy': 'same-origin',
  'Referrer-Policy': 'no-referrer',
  'X-Content-Type-Options': 'nosniff',
};

/** Objects are read strictly: what nobody asked for is refused rather than dropped in silence. */
function strict(schema: z.ZodType): z.ZodType {
  return schema instanceof z.ZodObject && schema.def.catchall === undefined ? schema.strict() : schema;
}

function parseAll(parts: Readonly<Record<'params' | 'query' | 'body', { schema: z.ZodType; value: unknown }>>) {
  const issues: { field: string; message: string }[] = [];
  const parsed: Record<string, unknown> = {};
  for (const [where, { schema, value }] of Object.entries(parts)) {
    const result = strict(schema).safeParse(value);
    if (result.success) parsed[where] = result.data;
    else issues.push(...result.error.issues.map(({ path, message }) => ({ field: [where, ...path].join('.'), message })));
  }
  return { parsed, issues };
}

async function projectExists(projectId: string): Promise<boolean> {
  const { models } = await openDatabase();
  return (await models.Project.count({ where: { id: projectId } })) > 0;
}

/** Not a member, or no such project: 404, the same for both. A member without the right: 403. */
async function authorise(user: SignedIn, action: Action, projectId: string | null): Promise<void> {
  if (projectId === null) {
    if (!can(user, action, null)) throw new Problem('forbidden');
    return;
  }
  if (!mayKnow(user, projectId) || !(await projectExists(projectId))) throw new Problem('not-found');
  if (!can(user, action, projectId)) throw new Problem('forbidden');
}

function answer(result: unknown, reply: z.ZodType | undefined): Response {
  const response = result instanceof Response ? result
    : result === undefined ? new Response(null, { status: 204 })
      : Response.json(reply ? reply.parse(result) : result);
  for (const [name, value] of Object.entries(apiHeaders)) if (!response.headers.has(name)) response.headers.set(name, value);
  return response;
}

/**
 * Makes a route handler: parse, authorise, call, present. `access.project` names the project from the parsed input.
 * What the handler returns is sent as JSON (a Response as it is, undefined as 204); what it throws is answered from
 * the table in errors.ts. Every route has a row in authorisation-matrix.ts.
 *
 * @example
 * export const GET = route(
 *   { access: { action: 'data.read', project: ({ params }) => params.projectId }, params: z.object({ projectId: idSchema }) },
 *   async ({ projectId }) => listTrees(projectId),
 * );
 */
export function route<P extends z.ZodType = None, Q extends z.ZodType = None, B extends z.ZodType = z.ZodUndefined>(
  options: RouteOptions<ProjectAccess<RouteInput<P, Q, B>>, P, Q, B>, handler: (call: RouteCall<P, Q, B, SignedIn, string>) => unknown,
): RouteHandler;
export function route<P extends z.ZodType = None, Q extends z.ZodType = None, B extends z.ZodType = z.ZodUndefined>(
  options: RouteOptions<'signed-in' | ServerAccess, P, Q, B>, handler: (call: RouteCall<P, Q, B, SignedIn, null>) => unknown,
): RouteHandler;
export function route<P extends z.ZodType = None, Q extends z.ZodType = None, B extends z.ZodType = z.ZodUndefined>(
  options: RouteOptions<'public', P, Q, B>, handler: (call: RouteCall<P, Q, B, SignedIn | null, null>) => unknown,
): RouteHandler;
export function route<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  options: RouteOptions<Access<RouteInput<P, Q, B>>, P, Q, B>, handler: (call: RouteCall<P, Q, B, never, never>) => unknown,
): RouteHandler {
  const access: Access<RouteInput<P, Q, B>> = options.access;
  const limit = options.maxBodyBytes ?? MIB;

  async function handle(request: Request, context: NextContext): Promise<Response> {
    if (CHANGING.has(request.method)) requireOwnOrigin(request);
    const user = await getUser(request);
    // Before the body is read: a stranger's bytes are not worth parsing.
    if (access !== 'public' && !user) throw new Problem('not-signed-in');
    const value = !options.body ? undefined : options.bodyKind === 'form' ? await readForm(request, limit) : await readJson(request, limit);
    const faults = options.body && !options.verbatim && options.bodyKind !== 'form' ? contentFaults(value) : [];
    if (faults.length > 0) throw new Problem('invalid-fields', { issues: faults });
    const { parsed, issues } = parseAll({
      params: { schema: options.params ?? none, value: (await context.params) ?? {} },
      query: { schema: options.query ?? none, value: onlyOnce([...new URL(request.url).searchParams], 'query') },
      body: { schema: options.body ?? z.undefined(), value },
    });
    // An address that cannot name anything names nothing.
    if (issues.some(({ field }) => field.startsWith('params'))) throw new Problem('not-found');
    if (issues.length > 0) throw new Problem('invalid-fields', { issues });
    const input = parsed as RouteInput<P, Q, B>;
    let projectId: string | null = null;
    if (typeof access === 'object' && user) {
      projectId = access.project === 'server' ? null : access.project(input);
      await authorise(user, access.action, projectId);
    }
    // The overloads above say what these are for each kind of access.
    return answer(await handler({ ...input, user: user as never, request, projectId: projectId as never }), options.reply);
  }

  const wrapped = async (request: Request, context: NextContext): Promise<Response> => {
    try {
      return await handle(request, context);
    } catch (error) {
      const problem = asProblem(error);
      if (problems[problem.code].status >= 500) console.error(`[api] ${request.method} ${new URL(request.url).pathname}`, error);
      return answer(problemResponse(problem), undefined);
    }
  };
  return Object.assign(wrapped, { access: typeof access === 'object' ? access.action : access });
}
