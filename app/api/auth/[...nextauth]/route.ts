import NextAuth from 'next-auth';
import type { NextRequest } from 'next/server';
import { authOptions } from '@/lib/server/auth';
import { Problem, problemResponse } from '@/lib/server/errors';

/** A sign-in form is a few hundred bytes. */
const MOST_BYTES = 16 * 1024;

type Context = { params: Promise<{ nextauth: string[] }> };

async function handle(request: NextRequest, context: Context): Promise<Response> {
  // The sign-in library reads the whole body by itself, so its length must be known before.
  if (request.method === 'POST' && !(Number(request.headers.get('content-length') ?? NaN) <= MOST_BYTES)) {
    return problemResponse(new Problem('too-large', { detail: `A stated length of at most ${MOST_BYTES} bytes is taken here.` }));
  }
  // Its types know Next as it was; the call itself is the documented one.
  const response: Response = await NextAuth(request, context as unknown as { params: { nextauth: string[] } }, authOptions());
  response.headers.set('X-Content-Type-Options', 'nosniff');
  response.headers.set('Cache-Control', 'private, no-store');
  return response;
}

export { handle as GET, handle as POST };
