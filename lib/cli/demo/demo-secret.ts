import { randomBytes } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';

/**
 * The secret with which the demo signs its sessions: made once, kept in the data folder for its owner's eyes only, so that
 * sign-ins outlive a restart. Only the demo reads it; `npm start` wants one of its own.
 */
export function demoSecret(dataFolder: string): string {
  const file = path.join(dataFolder, 'demo-secret');
  mkdirSync(dataFolder, { recursive: true });
  try {
    // Fails when the file exists, so that two starts at once cannot use different ones.
    writeFileSync(file, randomBytes(48).toString('base64'), { flag: 'wx', mode: 0o600 });
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
  }
  return readFileSync(file, 'utf8').trim();
}
