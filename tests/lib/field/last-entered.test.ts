import { describe, expect, it } from 'vitest';
import { lastEntered } from '@/app/(field)/field/_visit/last-entered';
import type { Reading, StemMeasurement } from '@/lib/schema/field';

const stem = (id: string, dbhReadingIds: string[], heightReadingIds: string[] = []) => ({ measurement: { id, dbhReadingIds, heightReadingIds } as unknown as StemMeasurement });
const reading = new Map(Object.entries({ a: '08:00', b: '08:05', c: '08:03', late: '08:09' })
  .map(([id, time]) => [id, { id, takenAt: `2026-06-01T${time}:00.000Z` } as Reading]));

describe('the entry that is read back', () => {
  it('is the stem with the newest standing reading, also when an earlier one was changed', () => {
    const stems = [stem('1', ['late']), stem('2', ['b'], ['c'])];
    expect(lastEntered({ reading }, stems)?.measurement.id).toBe('1');
    expect(lastEntered({ reading }, [stem('1', ['a']), stem('2', ['b'])])?.measurement.id).toBe('2');
    expect(lastEntered({ reading }, [stem('1', ['a'], ['late']), stem('2', ['b'])])?.measurement.id).toBe('1');
  });
  it('without readings is the last in the order of entry, and nothing without stems', () => {
    expect(lastEntered({ reading }, [stem('1', []), stem('2', ['unknown'])])?.measurement.id).toBe('2');
    expect(lastEntered({ reading }, [])).toBeNull();
  });
});
