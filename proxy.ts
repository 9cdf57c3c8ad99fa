import { NextResponse } from 'next/server';
import type { NextRequest } from 'next/server';
import { contentSecurityPolicy, fieldScriptHashes, notFoundScriptHashes } from '@/lib/server/route-csp';

/**
 * Sets the content security policy of pages: hashes for the static shell of the field, a nonce for everything that is
 * rendered on the server (Next reads it from the request's header and puts it on its scripts).
 */
export async function proxy(request: NextRequest): Promise<NextResponse> {
  const { pathname } = request.nextUrl;
  if (pathname === '/field' || pathname.startsWith('/field/')) {
    const policy = contentSecurityPolicy((await fieldScriptHashes()).map((hash) => `'${hash}'`));
    // The shell must be asked for anew each time it is online, or an old one would name scripts that are gone.
    return NextResponse.next({ headers: { 'Content-Security-Policy': policy, 'Cache-Control': 'no-cache' } });
  }
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64');
  const policy = contentSecurityPolicy([`'nonce-${nonce}'`, ...(await notFoundScriptHashes()).map((hash) => `'${hash}'`)]);
  const headers = new Headers(request.headers);
  headers.set('content-security-policy', policy);
  headers.set('x-nonce', nonce);
  return NextResponse.next({ request: { headers }, headers: { 'Content-Security-Policy': policy } });
}

// Not the API (a proxied body over 10 MB would be cut without an error), not the built files, not the worker.
export const config = { matcher: ['/((?!api/|api$|_next/|sw\\.js$).*)'] };
