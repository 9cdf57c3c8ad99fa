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
  it('the first key is kept at once, the last state when the page is left', () => {
    const kept: Draft[] = [];
    const state = begin();
    const keeper = new DraftKeeper({ draft: () => Promise.resolve(null), saveDraft: (draft) => Promise.resolve(void kept.push(draft)) }, { id: state.measurement.visitId, projectId: state.tree.projectId });
    const digits = () => kept.map(({ body }) => parseDraft(body)?.typing?.digits);
    keeper.offer(run(state, key('1')).state);
    expect(digits()).toEqual(['1']);
    keeper.offer(run(state, key('12')).state);
    expect(digits()).toEqual(['1']);
    keeper.stop();
    expect(digits()).toEqual(['1', '12']);
  });

  it('what was saved with a commit is not saved once more', () => {
    const kept: Draft[] = [];
    const state = begin();
    const keeper = new DraftKeeper({ draft: () => Promise.resolve(null), saveDraft: (draft) => Promise.resolve(void kept.push(draft)) }, { id: state.measurement.visitId, projectId: state.tree.projectId });
    keeper.note(state);
    expect(keeper.take()?.put.id).toBe(`visit:${state.measurement.visitId}`);
    keeper.stop();
    expect(kept).toEqual([]);
  });
});
