import { v7 } from 'uuid';
import { describe, expect, it } from 'vitest';
import { DraftKeeper } from '@/app/(field)/field/_entry/draft-keeper';
import { beginNewTree } from '@/app/(field)/field/_entry/begin-entry';
import { draftOf, parseDraft } from '@/app/(field)/field/_entry/entry-draft';
import { restoreDraft } from '@/app/(field)/field/_entry/restore-draft';
import { transition } from '@/app/(field)/field/_entry/transition';
import type { EntryEvent, EntryPorts, EntryState } from '@/app/(field)/field/_entry/types';
import type { Draft } from '@/lib/client/field-store-types';
import type { Json } from '@/lib/schema/common';
import type { RecordChange } from '@/lib/schema/record-change';
import { tooTall } from './entry-builder';
import { recordsAfter } from './records-builder';

const ports: EntryPorts = {
  newId: () => v7(), now: () => '2026-06-01T08:00:00.000Z', authorId: v7(), measurerId: v7(), recorderId: v7(), dbhUnit: 'cm', lengthUnit: 'm',
  parse: (digits) => Number(digits.replace(',', '.')), canonical: (_, value) => value, curveGroup: () => null, check: tooTall,
};
const begin = () => beginNewTree({ projectId: v7(), plotId: v7(), visitId: v7(), order: 1 }, '1', { tree: v7(), stem: v7(), measurement: v7() });

function run(state: EntryState, events: readonly EntryEvent[]): { state: EntryState; changes: RecordChange[] } {
  const changes: RecordChange[] = [];
  for (const event of events) {
    const step = transition(state, event, ports);
    state = step.state;
    changes.push(...step.changes);
  }
  return { state, changes };
}
const key = (text: string): EntryEvent[] => [...text].map((one) => ({ kind: 'key', key: one }));
const throughStore = (state: EntryState) => parseDraft(JSON.parse(JSON.stringify(draftOf(state))) as Json)!;

describe('what a kill leaves', () => {
  it('a tree of which nothing is saved comes back with its species, tag and digits', () => {
    const speciesId = v7();
    const { state } = run(begin(), [{ kind: 'species', speciesId }, ...key('12,')]);
    const back = restoreDraft(throughStore(state), recordsAfter([]))!;
    expect(back).toEqual(state);
  });

  it('digits of the height come back over the saved DBH, and stand once more as one reading', () => {
    const before = run(begin(), [...key('25.3'), { kind: 'next' }, ...key('2')]);
    const back = restoreDraft(throughStore(before.state), recordsAfter(before.changes))!;
    expect(back.typing).toEqual({ quantity: 'height', digits: '2', purpose: 'first', lookId: null });
    const after = run(back, [...key('1'), { kind: 'next' }]);
    expect(after.state.measurement).toMatchObject({ dbhDigits: '25.3', heightDigits: '21' });
    expect(after.changes.filter(({ kind }) => kind === 'create').map(({ entity }) => entity)).toEqual(['reading']);
  });

  it('the question where a changed value came from is asked again', () => {
    const doubted = run(begin(), [...key('25'), { kind: 'next' }, ...key('78'), { kind: 'next' }]);
    const again = run(doubted.state, [{ kind: 'read-again', lookId: doubted.state.looks[0]!.id, quantity: 'height' }, ...key('23.8'), { kind: 'next' }]);
    const back = restoreDraft(throughStore(again.state), recordsAfter(doubted.changes))!;
    expect(back.panel).toEqual({ kind: 'origin' });
    expect(back.typing?.digits).toBe('23.8');
  });

  it('a draft of another version or a torn one is none', () => {
    expect(parseDraft({ v: 2 })).toBeNull();
    expect(parseDraft(null)).toBeNull();
  });
});

describe('keeping the draft', () => {
  function slowStore() {
    const kept: Draft[] = [];
    const writes: (() => void)[] = [];
    const saveDraft = (draft: Draft) => new Promise<void>((resolve) => {
      kept.push(draft);
      writes.push(resolve);
    });
    const settle = async () => {
      writes.shift()?.();
      await new Promise((resolve) => setTimeout(resolve, 0));
    };
    return { kept, saveDraft, settle, draft: () => Promise.resolve(null), digits: () => kept.map(({ body }) => parseDraft(body)?.typing?.digits) };
  }
  const keeperOf = (store: ReturnType<typeof slowStore>, state: EntryState) => new DraftKeeper(store, { id: state.measurement.visitId, projectId: state.tree.projectId });

  it('the first key is kept at once, and what is typed meanwhile when that write has ended, the last state only', async () => {
    const store = slowStore();
    const state = begin();
    const keeper = keeperOf(store, state);
    for (const text of ['1', '12', '12,', '12,5']) keeper.offer(run(state, key(text)).state);
    expect(store.digits()).toEqual(['1']);
    await store.settle();
    expect(store.digits()).toEqual(['1', '12,5']);
    await store.settle();
    expect(store.digits()).toHaveLength(2);
  });

  it('a key typed while a commit carries a draft is kept after it, never overtaken by the older card', () => {
    const store = slowStore();
    const state = begin();
    const keeper = keeperOf(store, state);
    keeper.note(state);
    expect(keeper.hold()?.put.id).toBe(`visit:${state.measurement.visitId}`);
    keeper.offer(run(state, key('2')).state);
    expect(store.kept).toEqual([]);
    keeper.release(true);
    expect(store.digits()).toEqual(['2']);
  });

  it('what was saved with a commit is not saved once more; after a failed one it is', () => {
    const store = slowStore();
    const state = begin();
    const keeper = keeperOf(store, state);
    keeper.note(state);
    keeper.hold();
    keeper.release(true);
    expect(store.kept).toEqual([]);
    keeper.hold();
    keeper.release(false);
    expect(store.kept).toHaveLength(1);
  });
});
