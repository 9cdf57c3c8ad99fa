import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { sourceStamp } from './source-stamp';

/**
 * Builds unless the build at hand was made of exactly these sources. Result: `built`, `current` or `failed` (the build has
 * then said why itself).
 */
export function ensureBuilt(root: string = process.cwd()): 'built' | 'current' | 'failed' {
  const dist = path.resolve(root, process.env.LAMMAS_DIST || '.next');
  const stampFile = path.join(dist, 'lammas-source-stamp');
  const worker = path.join(root, 'public', 'sw.js');
  const isCurrent = existsSync(stampFile) && existsSync(path.join(dist, 'BUILD_ID')) && existsSync(worker)
    && readFileSync(stampFile, 'utf8') === sourceStamp(root);
  if (isCurrent) return 'current';
  const built = spawnSync('npm', ['run', '--silent', 'build'], {
    cwd: root, stdio: 'inherit', shell: process.platform === 'win32', env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
  });
  if (built.status !== 0) return 'failed';
  // After the build: whatever it rewrites among the sources (tsconfig.json) belongs to it.
  writeFileSync(stampFile, sourceStamp(root));
  return 'built';
}
