import type { Action } from './policies';

export type Method = 'GET' | 'HEAD' | 'POST' | 'PUT' | 'PATCH' | 'DELETE' | 'OPTIONS';

/** What a valid call for a project looks like, apart from `[projectId]` in the address and made-up ids for other `[…]` parts. */
export type SampleCall = { readonly query?: Readonly<Record<string, string>>; readonly body?: unknown; readonly form?: FormData };

export type AccessRow =
  /** Anyone, or anyone signed in. `why` says what guards what the answer holds. */
  | { readonly access: 'public' | 'signed-in'; readonly why: string }
  /** The sign-in library's own route, with its own token against forged requests. */
  | { readonly access: 'sign-in' }
  /** Members whose role allows `action`; others are told 404. */
  | { readonly access: Action; readonly sample?: (projectId: string) => SampleCall };

function sampleImport(): FormData {
  const form = new FormData();
  form.set('file', new File(['dbh,height,species\n'], 'trees.csv', { type: 'text/csv' }));
  for (const [name, value] of Object.entries({ dbhUnit: 'cm', lengthUnit: 'm', dbh: 'dbh', height: 'height', species: 'species' })) form.set(name, value);
  return form;
}

/**
 * Who may call what: file below app/api → method → row. Tests list the route files on disk and fail when a file or an
 * exported method has no row, when a row has no method, and when a row differs from what the handler itself declares.
 *
 * To add a route: write app/api/…/route.ts with `export const GET = route({ access: … }, …)`, then a row here under its
 * path. For a row with a project the tests call the handler as a signed-in person of another project and want 404: where
 * the call needs a query or a body to be valid (or names the project there), give `sample`, which gets the project's id.
 *
 * @example
 * 'v1/projects/[projectId]/import/route.ts': {
 *   POST: { access: 'data.import', sample: () => ({ body: { fileName: 'a.csv', dbhUnit: 'cm', lengthUnit: 'm' } }) },
 * },
 */
export const authorisationMatrix: Readonly<Record<string, Partial<Readonly<Record<Method, AccessRow>>>>> = {
  'auth/[...nextauth]/route.ts': { GET: { access: 'sign-in' }, POST: { access: 'sign-in' } },
  'health/route.ts': { GET: { access: 'public', why: 'holds only whether the database answers, its schema number and its epoch' } },
  'sync/pack/route.ts': { GET: { access: 'sync', sample: (projectId) => ({ query: { project: projectId } }) } },
  'sync/pull/route.ts': { GET: { access: 'sync', sample: (projectId) => ({ query: { project: projectId, cursor: '0' } }) } },
  'sync/push/route.ts': { POST: { access: 'signed-in', why: 'each operation is judged by the project it names; a denied one is kept aside and shown to nobody there' } },
  'v1/me/route.ts': { GET: { access: 'signed-in', why: 'holds the caller, and the projects of the caller' } },
  'v1/projects/route.ts': { GET: { access: 'signed-in', why: 'holds the projects of the caller' } },
  'v1/projects/[projectId]/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/visits/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/visits/[visitId]/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/trees/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/trees.csv/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/second-looks/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/second-looks.csv/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/dictionary/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/dictionary.csv/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/changes/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/quarantine/route.ts': { GET: { access: 'data.read' } },
  'v1/projects/[projectId]/curves/route.ts': {
    GET: { access: 'data.read' },
    POST: { access: 'curve.publish', sample: () => ({ body: { curveGroup: 'oak', form: 'curtis' } }) },
  },
  'v1/projects/[projectId]/imports/route.ts': {
    GET: { access: 'data.read' },
    POST: { access: 'data.import', sample: () => ({ form: sampleImport() }) },
  },
};
