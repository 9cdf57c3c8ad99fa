import { mkdirSync, mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { demoSecret } from '@/lib/cli/demo/demo-secret';
import { lanAddresses } from '@/lib/cli/demo/lan-addresses';
import { portIsFree } from '@/lib/cli/demo/port-is-free';
import { sourceStamp } from '@/lib/cli/demo/source-stamp';

let folder: string;
beforeEach(() => { folder = mkdtempSync(path.join(os.tmpdir(), 'lammas-demo-')); });
afterEach(() => rmSync(folder, { recursive: true, force: true }));

describe('the demo’s secret', () => {
  it('is made once, long enough for production, readable by its owner only, and kept', () => {
    const data = path.join(folder, 'data');
    const secret = demoSecret(data);
    expect(secret.length).toBeGreaterThanOrEqual(32);
    expect(demoSecret(data)).toBe(secret);
    expect(statSync(path.join(data, 'demo-secret')).mode & 0o077).toBe(0);
    expect(demoSecret(path.join(folder, 'other'))).not.toBe(secret);
  });
});

describe('the stamp of the sources', () => {
  const write = (name: string, text: string) => {
    mkdirSync(path.dirname(path.join(folder, name)), { recursive: true });
    writeFileSync(path.join(folder, name), text);
  };

  it('changes with every source, its name or its content, and with nothing that the build makes', () => {
    write('app/page.tsx', 'a');
    write('public/icon.svg', 'b');
    const stamp = sourceStamp(folder);
    write('public/sw.js', 'made');
    write('README.md', 'no part of a build');
    expect(sourceStamp(folder)).toBe(stamp);
    write('app/page.tsx', 'A');
    const changed = sourceStamp(folder);
    expect(changed).not.toBe(stamp);
    write('app/page.tsx', 'a');
    write('lib/x.ts', '');
    expect(sourceStamp(folder)).not.toBe(stamp);
    rmSync(path.join(folder, 'lib'), { recursive: true });
    expect(sourceStamp(folder)).toBe(stamp);
  });
});

describe('addresses for a phone', () => {
  const entry = (address: string, more: Partial<os.NetworkInterfaceInfo> = {}) =>
    ({ address, netmask: '', mac: '', internal: false, cidr: null, family: 'IPv4', ...more }) as os.NetworkInterfaceInfo;

  it('are those that another machine can reach: not loopback, not link-local, each once', () => {
    expect(lanAddresses({
      lo: [entry('127.0.0.1', { internal: true })],
      wlan0: [entry('192.168.1.20'), entry('169.254.3.4'), { ...entry('fe80::1'), family: 'IPv6', scopeid: 2 } as os.NetworkInterfaceInfo],
      eth0: [entry('192.168.1.20'), entry('10.0.0.7')],
      none: undefined,
    })).toEqual(['192.168.1.20', '10.0.0.7']);
  });
});

describe('a port', () => {
  it('is taken while something listens on it and free afterwards', async () => {
    const server = net.createServer();
    const port = await new Promise<number>((resolve) => server.listen(0, () => resolve((server.address() as net.AddressInfo).port)));
    expect(await portIsFree(port)).toBe(false);
    await new Promise((resolve) => server.close(resolve));
    expect(await portIsFree(port)).toBe(true);
  });
});
