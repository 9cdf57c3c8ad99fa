import { IDBFactory, IDBKeyRange } from 'fake-indexeddb';
import { describe, expect, it } from 'vitest';
import { FieldDatabase } from '@/lib/client/db';
import { StorageHungError, guarded } from '@/lib/client/guard';

const database = () => new FieldDatabase('watched', { indexedDB: new IDBFactory(), IDBKeyRange });
const never = () => new Promise<string>(() => undefined);

describe('the watchdog (rule 2)', () => {
  it('a call that hangs once is made once more on a database opened anew', async () => {
    let calls = 0;
    const db = database();
    expect(await guarded(db, () => { calls += 1; return calls === 1 ? never() : Promise.resolve('there'); }, 1500)).toBe('there');
    expect(calls).toBe(2);
    db.close();
  });
  it('a call that hangs twice is told', async () => {
    const db = database();
    await expect(guarded(db, never, 20)).rejects.toBeInstanceOf(StorageHungError);
    db.close();
  });
  it('an error of the call itself is not tried again', async () => {
    let calls = 0;
    const db = database();
    await expect(guarded(db, () => { calls += 1; return Promise.reject(new Error('full')); }, 20)).rejects.toThrow('full');
    expect(calls).toBe(1);
  });
});
