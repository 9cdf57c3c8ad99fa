import 'server-only';
import type { AuthOptions } from 'next-auth';
import { decode, encode } from 'next-auth/jwt';
import type { JWT } from 'next-auth/jwt';
import CredentialsProvider from 'next-auth/providers/credentials';
import { z } from 'zod';
import { openDatabase } from '@/models';
import { readEnvironment } from './env';
import { verifyPassword } from './password';
import type { SignedIn } from './policies';
import { forgetTurns, signInPerAccount, signInPerAddress, takeTurn } from './rate-limit';
import { addressHeader } from './rate-limit-address';
import { SESSION_DAYS, personOfSession, revokeSession, startSession } from './session';
import type { SessionClaims } from './session';

// The only module (with its route) that knows the sign-in library, so that it can be replaced.

const MAX_AGE_S = SESSION_DAYS * 86_400;
const credentialsSchema = z.object({ email: z.string().trim().toLowerCase().min(3).max(254), password: z.string().min(1).max(1000) });
const claimsSchema = z.object({ sub: z.string(), sid: z.string(), tv: z.int() });

/** Over https the browser itself holds the cookie to this host; over plain http it would refuse such a name. */
function cookieName(): string {
  return readEnvironment().https ? '__Host-lammas-session' : 'lammas-session';
}

function claimsOf(token: JWT | null): SessionClaims | null {
  const parsed = claimsSchema.safeParse(token);
  return parsed.success ? { userId: parsed.data.sub, sessionId: parsed.data.sid, tokenVersion: parsed.data.tv } : null;
}

/**
 * Checks an e-mail address and password and starts a session. Every failure is the same null: unknown address, wrong
 * password, disabled person, too many attempts.
 */
export async function signIn(credentials: unknown, address: string): Promise<SessionClaims | null> {
  const parsed = credentialsSchema.safeParse(credentials);
  if (!parsed.success) return null;
  const { email, password } = parsed.data;
  const account = `sign-in:account:${email}`;
  const turns = [takeTurn(`sign-in:address:${address}`, signInPerAddress), takeTurn(account, signInPerAccount)];
  if (turns.some(({ allowed }) => !allowed)) return null;
  const { models } = await openDatabase();
  const user = await models.User.findOne({ where: { email } });
  const right = await verifyPassword(password, user && !user.disabled ? user.passwordHash : null);
  if (!right || !user) return null;
  forgetTurns(account);
  return startSession(user.id);
}

/** The sign-in library's settings; read at each request, because they depend on the environment. */
export function authOptions(): AuthOptions {
  const { secret, https } = readEnvironment();
  return {
    secret,
    useSecureCookies: https,
    session: { strategy: 'jwt', maxAge: MAX_AGE_S },
    jwt: { maxAge: MAX_AGE_S },
    pages: { signIn: '/signin', error: '/signin', signOut: '/signin' },
    cookies: { sessionToken: { name: cookieName(), options: { httpOnly: true, sameSite: 'lax', path: '/', secure: https } } },
    providers: [
      CredentialsProvider({
        name: 'password',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        authorize: async (credentials, request) => {
          const claims = await signIn(credentials, String(request.headers?.[addressHeader()] ?? 'unknown'));
          return claims && { id: claims.userId, sid: claims.sessionId, tv: claims.tokenVersion };
        },
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) => {
        const { sub, sid, tv } = user && 'sid' in user && 'tv' in user ? { sub: user.id, sid: user.sid, tv: user.tv } : token;
        return { sub, sid, tv } as JWT;
      },
      session: async ({ session, token }) => {
        const claims = claimsOf(token);
        const person = claims && (await personOfSession(claims));
        return { expires: session.expires, ...(person ? { user: { name: person.name, email: person.email } } : {}) };
      },
      // Only ways inside this site are followed.
      redirect: ({ url, baseUrl }) => (/^\/(?![/\\])/.test(url) ? `${baseUrl}${url}` : url.startsWith(`${baseUrl}/`) ? url : baseUrl),
    },
    events: {
      signOut: async ({ token }) => {
        const claims = claimsOf(token);
        if (claims) await revokeSession(claims.sessionId);
      },
    },
  };
}

/** A `Cookie` header value that carries a session; what the sign-in sets in the browser. */
export async function sessionCookie({ userId, sessionId, tokenVersion }: SessionClaims): Promise<string> {
  const token = await encode({ token: { sub: userId, sid: sessionId, tv: tokenVersion }, secret: readEnvironment().secret, maxAge: MAX_AGE_S });
  return `${cookieName()}=${token}`;
}

function readCookie(header: string | null, name: string): string | null {
  for (const part of (header ?? '').split(';')) {
    const [key, ...value] = part.trim().split('=');
    if (key === name) return value.join('=');
  }
  return null;
}

/**
 * Who is signed in, with their roles as of now; null when nobody is. Asks the sessions table every time.
 * In a page: `getUser({ headers: await headers() })`.
 */
export async function getUser(request: { readonly headers: Pick<Headers, 'get'> }): Promise<SignedIn | null> {
  const token = readCookie(request.headers.get('cookie'), cookieName());
  if (!token) return null;
  const claims = claimsOf(await decode({ token, secret: readEnvironment().secret }).catch(() => null));
  return claims && personOfSession(claims);
}
