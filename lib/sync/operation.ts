import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import canonicalize from 'canonicalize';
import type { Operation } from '@/lib/schema/wire';

/** What of an operation is chosen by the one who makes it; the chain adds `prevHash` and `hash`. */
export type OperationInput = Omit<Operation, 'prevHash' | 'hash'>;

/** An operation as far as the chain is concerned; what else it holds may be anything. */
export type Link = { readonly seq: number; readonly prevHash: string; readonly hash: string };

export type ChainCheck =
  | { readonly ok: true; readonly hash: string }
  /** `seq`: the first operation that does not follow from the one before, or whose content is not what was hashed. */
  | { readonly ok: false; readonly seq: number; readonly reason: 'previous' | 'content' };

/**
 * Hash of an operation: SHA-256 over the 64 hex characters of `prevHash` and the RFC 8785 JSON of the operation
 * without `hash` (it does hold `prevHash`), as lower-case hex. Synchronous, so that it may run inside a database
 * transaction of the browser. Errors: a value that JSON cannot carry (NaN, infinity).
 */
export function hashOf(operation: { readonly prevHash: string }): string {
  const { hash: _, ...content } = operation as { readonly prevHash: string; readonly hash?: unknown };
  return bytesToHex(sha256(utf8ToBytes(operation.prevHash + (canonicalize(content) ?? ''))));
}

/** Chains an operation to the one before it. Errors: as hashOf. */
export function makeOperation(input: OperationInput, prevHash: string): Operation {
  const content = { ...input, prevHash };
  return { ...content, hash: hashOf(content) } as Operation;
}

/** Whether operations follow one another from `prevHash` on; with the hash of the last, or where it breaks first. */
export function verifyChain(operations: readonly Link[], prevHash: string): ChainCheck {
  let head = prevHash;
  for (const operation of operations) {
    if (operation.prevHash !== head) return { ok: false, seq: operation.seq, reason: 'previous' };
    if (hashOf(operation) !== operation.hash) return { ok: false, seq: operation.seq, reason: 'content' };
    head = operation.hash;
  }
  return { ok: true, hash: head };
}
