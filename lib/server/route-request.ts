import 'server-only';
import { promisify } from 'node:util';
import { gunzip } from 'node:zlib';
import { readEnvironment } from './env';
import { Problem } from './errors';
import type { Issue } from './errors';

const inflate = promisify(gunzip);

/** Deeper nesting says nothing that this program understands, and costs stack. */
const MOST_DEPTH = 8;
const DANGEROUS_KEYS: ReadonlySet<string> = new Set(['__proto__', 'constructor', 'prototype']);

/**
 * A request that changes something must come from our own pages: `Sec-Fetch-Site: same-origin`, or the exact Origin.
 * Over plain http (a server on the camp's own network, where browsers send no Sec-Fetch-Site) the Origin may also be
 * the host that was asked. Errors: Problem `wrong-origin`.
 */
export function requireOwnOrigin(request: Request): void {
  const { origin: ours, https } = readEnvironment();
  const site = request.headers.get('sec-fetch-site');
  const origin = request.headers.get('origin');
  if (site === 'same-origin') return;
  if (site !== null) throw new Problem('wrong-origin');
  if (origin === ours) return;
  if (!https && origin !== null && origin === `http://${request.headers.get('host') ?? ''}`) return;
  throw new Problem('wrong-origin');
}

/** Reads a body of at most `limit` bytes. Errors: Problem `too-large`. */
async function readBytes(request: Request, limit: number): Promise<Uint8Array<ArrayBuffer>> {
  const tooLarge = () => new Problem('too-large', { detail: `At most ${limit} bytes are taken here.` });
  if (Number(request.headers.get('content-length') ?? 0) > limit) throw tooLarge();
  const pieces: Uint8Array[] = [];
  let size = 0;
  const reader = request.body?.getReader();
  while (reader) {
    const { done, value } = await reader.read();
    if (done) break;
    size += value.byteLength;
    if (size > limit) {
      await reader.cancel();
      throw tooLarge();
    }
    pieces.push(value);
  }
  return Uint8Array.from(Buffer.concat(pieces));
}

async function inflated(bytes: Uint8Array, limit: number): Promise<Uint8Array> {
  try {
    return await inflate(bytes, { maxOutputLength: limit });
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ERR_BUFFER_TOO_LARGE') {
      throw new Problem('too-large', { detail: `At most ${limit} bytes are taken here, inflated.` });
    }
    throw new Problem('invalid-request', { detail: 'The body is not gzip.', cause: error });
  }
}

/** What no body may hold, with where it is: dangerous keys, nesting deeper than 8. */
export function contentFaults(value: unknown, field = 'body', depth = 1): Issue[] {
  if (typeof value !== 'object' || value === null) return [];
  if (depth > MOST_DEPTH) return [{ field, message: `nested deeper than ${MOST_DEPTH}` }];
  return Object.entries(value).flatMap(([key, inner]) => {
    const path = `${field}.${key}`;
    return DANGEROUS_KEYS.has(key) ? [{ field: path, message: 'this name is not allowed' }] : contentFaults(inner, path, depth + 1);
  });
}

/** Reads a JSON body, plain or gzip (by Content-Encoding, or as application/gzip). */
export async function readJson(request: Request, limit: number): Promise<unknown> {
  const type = (request.headers.get('content-type') ?? '').split(';')[0]?.trim().toLowerCase();
  const encoding = (request.headers.get('content-encoding') ?? 'identity').trim().toLowerCase();
  if ((type !== 'application/json' && type !== 'application/gzip') || (encoding !== 'identity' && encoding !== 'gzip')) {
    throw new Problem('unsupported-media-type', { detail: 'JSON or gzip of JSON is taken here.' });
  }
  const bytes = await readBytes(request, limit);
  const text = type === 'application/gzip' || encoding === 'gzip' ? await inflated(bytes, limit) : bytes;
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(text));
  } catch (error) {
    throw new Problem('invalid-request', { detail: 'The body is not JSON in UTF-8.', cause: error });
  }
}

/** Reads a multipart form: fields as text, uploads as File. A name may come once. */
export async function readForm(request: Request, limit: number): Promise<Record<string, string | File>> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^multipart\/form-data\s*;/i.test(type)) throw new Problem('unsupported-media-type', { detail: 'A multipart form is taken here.' });
  const bytes = await readBytes(request, limit);
  let form: FormData;
  try {
    form = await new Response(bytes, { headers: { 'content-type': type } }).formData();
  } catch (error) {
    throw new Problem('invalid-request', { detail: 'The body is not a multipart form.', cause: error });
  }
  return onlyOnce([...form.entries()], 'body');
}

/** A record of entries of which no name is dangerous or comes twice. */
export function onlyOnce<T>(entries: readonly (readonly [string, T])[], where: string): Record<string, T> {
  const issues: Issue[] = [];
  const seen = new Map<string, T>();
  for (const [name, value] of entries) {
    if (DANGEROUS_KEYS.has(name)) issues.push({ field: `${where}.${name}`, message: 'this name is not allowed' });
    else if (seen.has(name)) issues.push({ field: `${where}.${name}`, message: 'given more than once' });
    seen.set(name, value);
  }
  if (issues.length > 0) throw new Problem('invalid-fields', { issues });
  return Object.fromEntries(seen);
}
