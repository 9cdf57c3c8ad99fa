import 'server-only';
import { StoreError } from './write-queue';

/** Every problem that a handler can answer with: status and title, in one place. */
export const problems = {
  'invalid-request': { status: 400, title: 'The request does not say what it must' },
  'not-signed-in': { status: 401, title: 'Sign in first' },
  forbidden: { status: 403, title: 'Your role in this project does not allow that' },
  'wrong-origin': { status: 403, title: 'The request does not come from this site' },
  'not-found': { status: 404, title: 'There is no such thing here' },
  conflict: { status: 409, title: 'It has changed meanwhile' },
  fork: { status: 409, title: 'This device was copied or set back; it needs a new id' },
  epoch: { status: 409, title: 'The server was restored; send again what it lacks' },
  gap: { status: 409, title: 'Operations are missing in between' },
  'too-large': { status: 413, title: 'The request is too large' },
  'unsupported-media-type': { status: 415, title: 'This kind of content is not taken here' },
  'invalid-fields': { status: 422, title: 'Some values are not right' },
  'wrong-unit': { status: 422, title: 'The units are not those of the project' },
  'too-many-requests': { status: 429, title: 'Too many requests; wait a little' },
  internal: { status: 500, title: 'Something went wrong on the server' },
  'store-unavailable': { status: 503, title: 'The server could not store this now' },
  'store-full': { status: 507, title: 'The server has no room left' },
} as const satisfies Record<string, { status: number; title: string }>;

export type ProblemCode = keyof typeof problems;

/** One thing wrong with one field; `field` is a path such as `body.trees.3.dbhCm`. */
export type Issue = { readonly field: string; readonly message: string };

type Details = {
  readonly detail?: string;
  readonly issues?: readonly Issue[];
  /** Further members of the answer, as RFC 9457 allows. */
  readonly members?: Readonly<Record<string, unknown>>;
  readonly headers?: Readonly<Record<string, string>>;
  readonly cause?: unknown;
};

/** Thrown by a handler, answered by the wrapper as application/problem+json. */
export class Problem extends Error {
  override readonly name = 'Problem';
  constructor(readonly code: ProblemCode, readonly details: Details = {}) {
    super(details.detail ?? problems[code].title, { cause: details.cause });
  }
}

/** What an error is to the outside. What is not expected becomes `internal`, of which nothing but that is told. */
export function asProblem(error: unknown): Problem {
  if (error instanceof Problem) return error;
  if (error instanceof StoreError) return new Problem(error.kind === 'full' ? 'store-full' : 'store-unavailable', { cause: error, headers: { 'Retry-After': '30' } });
  return new Problem('internal', { cause: error });
}

/** The answer to a problem (RFC 9457), with every issue, and `code` for programs. */
export function problemResponse({ code, details }: Problem): Response {
  const { status, title } = problems[code];
  const body = {
    type: `urn:lammas:problem:${code}`, title, status,
    ...(details.detail === undefined ? {} : { detail: details.detail }),
    code,
    ...(details.issues === undefined ? {} : { issues: details.issues }),
    ...details.members,
  };
  return new Response(JSON.stringify(body), { status, headers: { ...details.headers, 'Content-Type': 'application/problem+json' } });
}
