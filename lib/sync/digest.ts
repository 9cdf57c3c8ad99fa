import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';

/**
 * Digest of a project's records: SHA-256 over the lines `id:revision`, sorted by character code and joined by line
 * feeds, as lower-case hex. Tombstones count. Device and server agree at rest, or one of them has missed something.
 */
export function digestOf(records: readonly { readonly id: string; readonly revision: number }[]): string {
  const lines = records.map(({ id, revision }) => `${id}:${revision}`).sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
  return bytesToHex(sha256(utf8ToBytes(lines.join('\n'))));
}
