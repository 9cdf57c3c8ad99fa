import 'server-only';
import { z } from 'zod';

const address = z.string().trim().min(1);

/** What the server reads from its environment; each message says what to set. */
const environmentSchema = z.object({
  NODE_ENV: z.enum(['production', 'development', 'test']).default('development'),
  PORT: z.string().default('3000').transform(Number)
    .refine((port) => Number.isInteger(port) && port >= 1 && port <= 65_535, 'PORT must be a number from 1 to 65535, for example PORT=3000'),
  NEXTAUTH_SECRET: z.string().optional(),
  NEXTAUTH_URL: z.string().optional().refine((url) => url === undefined || originOf(url) !== null,
    'NEXTAUTH_URL must be the address people open, without a path, for example NEXTAUTH_URL=https://lammas.example.org'),
  LAMMAS_DATA: z.string().trim().min(1, 'LAMMAS_DATA is set but empty: name the folder that keeps the data, or unset it').default('.data'),
  LAMMAS_DIST: z.string().default('.next'),
  LAMMAS_TRUSTED_PROXIES: z.string().default('').transform((list) => list.split(',').map((entry) => entry.trim()).filter(Boolean))
    .pipe(z.array(address)),
}).superRefine((env, context) => {
  if (env.NODE_ENV !== 'production') return;
  if (!env.NEXTAUTH_SECRET) {
    context.addIssue({ code: 'custom', path: ['NEXTAUTH_SECRET'], message: 'NEXTAUTH_SECRET is not set: sessions are signed with it. Make one with: openssl rand -base64 48' });
  } else if (env.NEXTAUTH_SECRET.length < 32) {
    context.addIssue({ code: 'custom', path: ['NEXTAUTH_SECRET'], message: 'NEXTAUTH_SECRET is too short: at least 32 characters. Make one with: openssl rand -base64 48' });
  }
  if (!env.NEXTAUTH_URL) {
    context.addIssue({ code: 'custom', path: ['NEXTAUTH_URL'], message: `NEXTAUTH_URL is not set: name the address people open, for example NEXTAUTH_URL=http://localhost:${env.PORT}` });
  }
});

export type Environment = {
  readonly production: boolean;
  readonly port: number;
  readonly secret: string;
  /** Scheme, host and port of the address people open. */
  readonly origin: string;
  readonly https: boolean;
  readonly dist: string;
  /** Addresses of reverse proxies whose X-Forwarded-For is believed. */
  readonly trustedProxies: readonly string[];
};

/** The environment cannot be served with; `faults` has a line for each, saying what to set. */
export class EnvironmentError extends Error {
  override readonly name = 'EnvironmentError';
  constructor(readonly faults: readonly string[]) {
    super(`The environment is not right:\n${faults.map((fault) => `  - ${fault}`).join('\n')}`);
  }
}

function originOf(url: string): string | null {
  if (!URL.canParse(url)) return null;
  const { protocol, origin, pathname } = new URL(url);
  return (protocol === 'http:' || protocol === 'https:') && pathname === '/' ? origin : null;
}

/** Never used in production, where a secret is required. */
const DEVELOPMENT_SECRET = 'for development only, never for production';

/** Reads and checks the environment. Errors: EnvironmentError with all faults. */
export function readEnvironment(source: Readonly<Record<string, string | undefined>> = process.env): Environment {
  const parsed = environmentSchema.safeParse(source);
  if (!parsed.success) throw new EnvironmentError(parsed.error.issues.map(({ message }) => message));
  const env = parsed.data;
  const origin = originOf(env.NEXTAUTH_URL ?? '') ?? `http://localhost:${env.PORT}`;
  return {
    production: env.NODE_ENV === 'production',
    port: env.PORT,
    secret: env.NEXTAUTH_SECRET || DEVELOPMENT_SECRET,
    origin,
    https: origin.startsWith('https:'),
    dist: env.LAMMAS_DIST,
    trustedProxies: env.LAMMAS_TRUSTED_PROXIES,
  };
}
