import { NextRequest } from 'next/server';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { mkdir, mkdtemp, writeFile } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { contentSecurityPolicy } from '@/lib/server/route-csp';
import { config } from '@/proxy';

const HASH = `sha256-${'A'.repeat(43)}=`;

async function policyOf(pathname: string, distFile?: string): Promise<Headers> {
  vi.resetModules();
  vi.stubEnv('NODE_ENV', 'production');
  const folder = await mkdtemp(path.join(os.tmpdir(), 'lammas-dist-'));
  if (distFile !== undefined) await writeFile(path.join(folder, 'field-csp.json'), distFile);
  vi.stubEnv('LAMMAS_DIST', path.relative(process.cwd(), folder));
  const { proxy } = await import('@/proxy');
  return (await proxy(new NextRequest(`http://localhost:3310${pathname}`))).headers;
}
const scriptSrc = (headers: Headers) => /script-src ([^;]*)/.exec(headers.get('content-security-policy') ?? '')?.[1];

afterEach(() => { vi.unstubAllEnvs(); vi.restoreAllMocks(); });

describe('the content security policy', () => {
  it('in production names nothing unsafe and nothing of other sites', () => {
    const policy = contentSecurityPolicy([], true);
    expect(policy).not.toMatch(/unsafe|\*|http/);
    expect(policy).toMatch(/^default-src 'none'; script-src 'self'; style-src 'self';/);
    for (const directive of ["object-src 'none'", "base-uri 'none'", "frame-ancestors 'none'", "form-action 'self'"]) expect(policy).toContain(directive);
  });
  it.each(['/field', '/field/plots/7'])('of %s lets the scripts run that the build named, and is asked for anew each time', async (pathname) => {
    const headers = await policyOf(pathname, JSON.stringify({ scriptHashes: [HASH] }));
    expect(scriptSrc(headers)).toBe(`'self' '${HASH}'`);
    expect(headers.get('cache-control')).toBe('no-cache');
  });
  it.each([['missing', undefined], ['not JSON', '{'], ['not hashes', '{"scriptHashes":["\'unsafe-inline\'"]}']])(
    'of the field lets no inline script run, and says so in the log, when the file of the build is %s', async (_, file) => {
      const log = vi.spyOn(console, 'error').mockImplementation(() => undefined);
      expect(scriptSrc(await policyOf('/field', file))).toBe("'self'");
      expect(log).toHaveBeenCalledOnce();
    });
  it.each(['/office', '/signin', '/fieldwork'])('of %s has a nonce of its own for each request, which the page is told', async (pathname) => {
    const [one, two] = [await policyOf(pathname), await policyOf(pathname)];
    expect(scriptSrc(one)).toMatch(/^'self' 'nonce-[A-Za-z0-9+/]{22}=='$/);
    expect(scriptSrc(one)).not.toBe(scriptSrc(two));
    expect(one.get('x-middleware-request-content-security-policy')).toBe(one.get('content-security-policy'));
  });
  it('of a rendered page names the scripts of the page for unknown addresses too', async () => {
    vi.resetModules();
    vi.stubEnv('NODE_ENV', 'production');
    const folder = await mkdtemp(path.join(os.tmpdir(), 'lammas-dist-'));
    await mkdir(path.join(folder, 'server', 'app'), { recursive: true });
    await writeFile(path.join(folder, 'server', 'app', '_not-found.html'), '<script src="/a.js" async=""></script><script>abc</script>');
    vi.stubEnv('LAMMAS_DIST', path.relative(process.cwd(), folder));
    const { proxy } = await import('@/proxy');
    // SHA-256 of "abc": FIPS 180-4 example, here in base64.
    expect(scriptSrc((await proxy(new NextRequest('http://localhost:3310/nope'))).headers)).toMatch(/ 'nonce-[^']+' 'sha256-ungWv48Bz\+pBQUDeXa4iI7ADYaOWF3qctBD\/YfIAFa0='$/);
  });
});

describe('the proxy', () => {
  const matches = (pathname: string) => config.matcher.some((source) => new RegExp(`^${source}$`).test(pathname));
  it.each(['/api/sync/push', '/api/health', '/_next/static/chunks/a.js', '/sw.js'])('does not stand before %s', (pathname) => {
    expect(matches(pathname)).toBe(false);
  });
  it.each(['/', '/field', '/field/plots/7', '/office', '/signin', '/apiary'])('stands before %s', (pathname) => {
    expect(matches(pathname)).toBe(true);
  });
});
