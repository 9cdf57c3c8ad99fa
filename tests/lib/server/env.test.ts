import { describe, expect, it } from 'vitest';
import { EnvironmentError, readEnvironment } from '@/lib/server/env';

const production = { NODE_ENV: 'production', NEXTAUTH_SECRET: 's'.repeat(32), NEXTAUTH_URL: 'https://lammas.example.org' };
function faultsOf(source: Record<string, string | undefined>): readonly string[] {
  try {
    readEnvironment(source);
    return [];
  } catch (error) {
    if (error instanceof EnvironmentError) return error.faults;
    throw error;
  }
}

describe('the environment', () => {
  it('of production is read', () => {
    expect(readEnvironment({ ...production, PORT: '8080', LAMMAS_TRUSTED_PROXIES: '10.0.0.1, 10.0.0.2' })).toEqual({
      production: true, port: 8080, secret: production.NEXTAUTH_SECRET, origin: 'https://lammas.example.org', https: true, dist: '.next',
      trustedProxies: ['10.0.0.1', '10.0.0.2'],
    });
  });
  it('of development needs nothing', () => {
    expect(readEnvironment({})).toMatchObject({ production: false, port: 3000, origin: 'http://localhost:3000', https: false });
  });
  it.each([
    ['no secret', { NEXTAUTH_SECRET: undefined }, /NEXTAUTH_SECRET is not set.*openssl/],
    ['a short secret', { NEXTAUTH_SECRET: 's'.repeat(31) }, /NEXTAUTH_SECRET is too short/],
    ['no address', { NEXTAUTH_URL: undefined }, /NEXTAUTH_URL is not set/],
    ['an address with a path', { NEXTAUTH_URL: 'https://a.example/b' }, /NEXTAUTH_URL must be/],
    ['an address that is none', { NEXTAUTH_URL: 'lammas' }, /NEXTAUTH_URL must be/],
    ['a port that is none', { PORT: '0' }, /PORT must be/],
    ['an empty data folder', { LAMMAS_DATA: ' ' }, /LAMMAS_DATA is set but empty/],
  ])('of production with %s is refused with a line that says what to set', (_, change, line) => {
    expect(faultsOf({ ...production, ...change })).toEqual([expect.stringMatching(line)]);
  });
  it('is refused with every fault at once', () => {
    expect(faultsOf({ NODE_ENV: 'production' })).toHaveLength(2);
  });
});
