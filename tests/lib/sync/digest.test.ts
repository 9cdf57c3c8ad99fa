import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { digestOf } from '@/lib/sync/digest';

describe('the digest of a project (rule 5)', () => {
  it('is SHA-256 of the sorted lines id:revision', () => {
    const expected = createHash('sha256').update('a:3\nb:1').digest('hex');
    expect(digestOf([{ id: 'b', revision: 1 }, { id: 'a', revision: 3 }])).toBe(expected);
  });
  it('of nothing is SHA-256 of nothing (FIPS 180-4 example value)', () => {
    expect(digestOf([])).toBe('e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855');
  });
  it('does not depend on order', () => {
    fc.assert(fc.property(fc.uniqueArray(fc.record({ id: fc.uuid(), revision: fc.nat() }), { selector: ({ id }) => id }), (records) => {
      expect(digestOf([...records].reverse())).toBe(digestOf(records));
    }));
  });
});
