import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { chmodSync, cpSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';

const script = path.resolve('lib/cli/ensure-installed.mjs');
let base: string;
beforeEach(() => { base = mkdtempSync(path.join(os.tmpdir(), 'lammas-ensure-')); });
afterEach(() => rmSync(base, { recursive: true, force: true }));

/** A project that holds the command, a lock file and, in place of npm, a program that notes where it was called. */
function project(name: string) {
  const root = path.join(base, name);
  const npm = path.join(base, 'npm.cjs');
  const calls = path.join(base, 'calls');
  mkdirSync(path.join(root, 'lib/cli'), { recursive: true });
  cpSync(script, path.join(root, 'lib/cli/ensure-installed.mjs'));
  for (const file of ['package.json', 'package-lock.json']) writeFileSync(path.join(root, file), '{}');
  writeFileSync(path.join(root, '.npmrc'), 'fund=false\n');
  writeFileSync(npm, `
    const fs = require('node:fs');
    fs.appendFileSync(${JSON.stringify(calls)}, process.cwd() + ' ' + process.argv.slice(2).join(' ') + '\\n');
    if (process.env.NPM_FAILS) process.exit(1);
    fs.mkdirSync('node_modules/sqlite3', { recursive: true });
    fs.writeFileSync('node_modules/sqlite3/index.js', '');
    fs.writeFileSync('node_modules/.package-lock.json', '{}');
  `);
  return {
    root,
    run: (env: Readonly<Record<string, string>> = {}) => spawnSync(process.execPath, [path.join(root, 'lib/cli/ensure-installed.mjs')], {
      encoding: 'utf8', env: { ...process.env, npm_execpath: npm, ...env },
    }),
    calls: () => (existsSync(calls) ? readFileSync(calls, 'utf8').trim().split('\n') : []),
  };
}

describe('ensure-installed', () => {
  it('installs by npm ci with the packages of the tests, whatever NODE_ENV says, and then leaves it alone', () => {
    const { root, run, calls } = project('plain');
    expect(run({ NODE_ENV: 'production' }).status).toBe(0);
    expect(calls()).toHaveLength(1);
    expect(calls()[0]).toMatch(new RegExp(`^${root} ci .*--include=dev`));
    expect(run().status).toBe(0);
    expect(calls()).toHaveLength(1);
  });

  it('a lock file with a newer time but the same content installs nothing; another content does', () => {
    const { root, run, calls } = project('plain');
    run();
    utimesSync(path.join(root, 'package-lock.json'), new Date(), new Date(Date.now() + 60_000));
    run();
    expect(calls()).toHaveLength(1);
    writeFileSync(path.join(root, 'package-lock.json'), '{"changed":true}');
    run();
    expect(calls()).toHaveLength(2);
    const stamp = readFileSync(path.join(root, 'node_modules/.lammas-lock-sha256'), 'utf8');
    expect(stamp).toBe(createHash('sha256').update('{"changed":true}').digest('hex'));
  });

  it('below a folder with a blank in its name it installs elsewhere and moves the packages in', () => {
    const { root, run, calls } = project('a folder with blanks');
    expect(run().status).toBe(0);
    expect(calls()[0]).not.toContain('blanks');
    expect(existsSync(path.join(root, 'node_modules/sqlite3/index.js'))).toBe(true);
    const scratch = calls()[0]!.split(' ')[0]!;
    expect(existsSync(scratch)).toBe(false);
  });

  it('a failed installation without compilers says in one line which are missing, and exits 1', () => {
    const { run } = project('plain');
    const bin = path.join(base, 'bin');
    mkdirSync(bin);
    writeFileSync(path.join(bin, 'make'), '#!/bin/sh\nexit 0\n');
    chmodSync(path.join(bin, 'make'), 0o755);
    const result = run({ NPM_FAILS: '1', PATH: bin });
    expect(result.status).toBe(1);
    expect(result.stderr.trim()).toBe('sqlite3 must be compiled here, and python3, g++ are missing: install them (on Debian: apt-get install -y python3 make g++) and run the command again.');
  });
});
