import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { GENESIS_HASH, operationSchema } from '@/lib/schema/wire';
import { hashOf, makeOperation, verifyChain } from '@/lib/sync/operation';
import type { OperationInput } from '@/lib/sync/operation';

const input = (seq: number, fields: OperationInput['fields'] = { remarks: { old: '', new: 'fork at 3 m' } }): OperationInput => ({
  opId: '01890000-0000-7000-8000-00000000000a', deviceId: '01890000-0000-7000-8000-00000000000b', seq,
  projectId: '01890000-0000-7000-8000-00000000000c', authorId: '01890000-0000-7000-8000-00000000000d', entity: 'stemMeasurement',
  recordId: '01890000-0000-7000-8000-00000000000e', kind: 'set', group: 'remarks', fields, reason: null, baseCursor: 0, schemaV: 1,
  appV: 'test', wallClock: '2026-06-01T08:00:00.000Z', monotonicMs: 12.5,
});
const chainOf = (n: number) => {
  const operations: ReturnType<typeof makeOperation>[] = [];
  for (let seq = 1; seq <= n; seq += 1) operations.push(makeOperation(input(seq), operations.at(-1)?.hash ?? GENESIS_HASH));
  return operations;
};

describe('the hash of an operation (rule 1)', () => {
  it('is SHA-256 of the previous hash followed by the RFC 8785 JSON without the hash', () => {
    // RFC 8785, section 3.2.2: members sorted by UTF-16 code units, no white space, ES number and string forms.
    const canonical = '{"a":[1,"é"],"b":1e+21,"prevHash":"' + GENESIS_HASH + '","z":null}';
    const expected = createHash('sha256').update(GENESIS_HASH + canonical, 'utf8').digest('hex');
    expect(hashOf({ z: null, b: 1e21, prevHash: GENESIS_HASH, a: [1, 'é'] } as { prevHash: string })).toBe(expected);
  });

  it('does not depend on the order of members or on a hash already there', () => {
    const operation = makeOperation(input(1), GENESIS_HASH);
    const turned = Object.fromEntries(Object.entries(operation).reverse()) as typeof operation;
    expect(hashOf(turned)).toBe(operation.hash);
    expect(operationSchema.parse(operation)).toEqual(operation);
  });

  it('covers members that this version does not know', () => {
    const operation = makeOperation(input(1), GENESIS_HASH);
    expect(hashOf({ ...operation, later: true } as typeof operation)).not.toBe(operation.hash);
  });
});

describe('the chain (invariant 17)', () => {
  it('holds from the genesis hash to the last operation', () => {
    const operations = chainOf(4);
    expect(verifyChain(operations, GENESIS_HASH)).toEqual({ ok: true, hash: operations[3]!.hash });
    expect(verifyChain([], GENESIS_HASH)).toEqual({ ok: true, hash: GENESIS_HASH });
  });

  it('names the first operation whose content was changed', () => {
    const operations = chainOf(4);
    operations[2] = { ...operations[2]!, wallClock: '2026-06-01T08:00:01.000Z' };
    expect(verifyChain(operations, GENESIS_HASH)).toEqual({ ok: false, seq: 3, reason: 'content' });
  });

  it('names the operation that does not follow from the one before', () => {
    const [first, , third] = chainOf(3);
    expect(verifyChain([first!, third!], GENESIS_HASH)).toEqual({ ok: false, seq: 3, reason: 'previous' });
  });
});
