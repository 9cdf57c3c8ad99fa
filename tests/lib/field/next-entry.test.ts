import { describe, expect, it } from 'vitest';
import { anotherStemEntry, knownStems, nextEntry, nextTag, stemLabel, storedEntry, withNewIds } from '@/app/(field)/field/_entry/next-entry';
import { deleteStem, restoreStem } from '@/app/(field)/field/_entry/delete-stem';
import { inverse } from '@/app/(field)/field/_entry/inverse';
import type { EntityName } from '@/lib/schema/entities';
import type { ProjectRecords } from '@/app/(field)/field/_data/project-records';
import { PLACE, card, countingIds } from './entry-builder';
import { recordsAfter } from './records-builder';

const VISIT = { id: PLACE.visitId, projectId: PLACE.projectId, plotId: PLACE.plotId };
const LATER = { ...VISIT, id: 'later' };
const former = (records: ProjectRecords) => (entity: EntityName, id: string) =>
  (records as unknown as Record<string, ReadonlyMap<string, Record<string, unknown>>>)[entity]?.get(id) ?? null;

const oneTree = () => card().send({ kind: 'species', speciesId: 's' }).keys('25.3').send({ kind: 'next' }).keys('21').send({ kind: 'next' });

describe('which tree comes to the card', () => {
  it('tags count on from the highest ever used, so that a deleted tree keeps its own', () => {
    const entry = oneTree();
    const records = recordsAfter(entry.changes());
    expect(nextTag(records, PLACE.plotId)).toBe('2');
    expect(nextTag(recordsAfter(deleteStem(records, entry.state().measurement.id), records), PLACE.plotId)).toBe('2');
  });

  it('at a later visit the known tree comes first, with its species and without its values', () => {
    const entry = oneTree();
    const next = nextEntry(recordsAfter(entry.changes()), LATER, countingIds());
    expect(next.tree.id).toBe(entry.state().tree.id);
    expect(next.measurement).toMatchObject({ speciesId: 's', dbhDigits: null, heightDigits: null, visitId: 'later', order: 1 });
    expect(next.saved).toEqual({ tree: true, stem: true, measurement: false });
  });

  it('a tree that this visit has found is not offered again', () => {
    expect(knownStems(recordsAfter(oneTree().changes()), PLACE.plotId, VISIT.id)).toEqual([]);
  });

  it('another stem of tree 1 is 1b, of the same species', () => {
    const entry = oneTree();
    const stem = anotherStemEntry(recordsAfter(entry.changes()), VISIT, entry.state(), countingIds());
    expect(stemLabel(stem.tree, stem.stem)).toBe('1b');
    expect(stem.measurement).toMatchObject({ speciesId: 's', order: 2 });
    expect(stem.saved).toMatchObject({ tree: true, stem: false });
  });

  it('a saved stem comes back with its readings, its doubts and its open question', () => {
    const entry = card().keys('25').send({ kind: 'next' }).keys('78').send({ kind: 'close' });
    const back = storedEntry(recordsAfter(entry.changes()), entry.state().measurement.id)!;
    expect(back.readings).toHaveLength(2);
    expect(back.panel).toMatchObject({ kind: 'doubt', lookId: back.looks[0]?.id });
  });
});

describe('undo and delete', () => {
  it('undoing puts every field back and only deletes what was made', () => {
    const entry = card().keys('25').send({ kind: 'pause' });
    const before = recordsAfter(entry.changes());
    const made = entry.changes().length;
    entry.send({ kind: 'focus', quantity: 'height' }).keys('78').send({ kind: 'pause' });
    const changes = entry.changes().slice(made);
    const after = recordsAfter(changes, before);
    const undone = recordsAfter(inverse(changes, former(before)), after);
    expect(undone.stemMeasurement).toEqual(before.stemMeasurement);
    expect([...undone.secondLook.values()].map(({ deleted }) => deleted)).toEqual([true]);
    expect([...undone.reading.values()].filter(({ deleted }) => !deleted)).toEqual([...before.reading.values()]);
  });

  it('an undone tree that is typed again gets ids of its own', () => {
    const entry = card();
    const fresh = withNewIds(entry.state(), () => 'fresh');
    expect([fresh.tree.id, fresh.stem.treeId, fresh.measurement.stemId]).toEqual(['fresh', 'fresh', 'fresh']);
    expect(withNewIds(entry.keys('1').send({ kind: 'pause' }).state(), () => 'fresh').tree.id).not.toBe('fresh');
  });

  it('deleting leaves tombstones of measurement, stem and tree, and restoring brings all back', () => {
    const entry = oneTree();
    const records = recordsAfter(entry.changes());
    const id = entry.state().measurement.id;
    const deleted = recordsAfter(deleteStem(records, id), records);
    expect([...deleted.tree.values(), ...deleted.stem.values(), ...deleted.stemMeasurement.values()].map((record) => record.deleted)).toEqual([true, true, true]);
    expect(recordsAfter(restoreStem(deleted, id), deleted)).toEqual(records);
  });

  it('a tree that an earlier visit measured stays when this visit takes its own stem back', () => {
    const records = recordsAfter(oneTree().changes());
    const again = nextEntry(records, LATER, countingIds());
    const measurement = { ...again.measurement, id: 'm2' };
    const both = recordsAfter([{ entity: 'stemMeasurement', recordId: 'm2', kind: 'create', values: measurement }], records);
    expect(deleteStem(both, 'm2')).toEqual([{ entity: 'stemMeasurement', recordId: 'm2', kind: 'delete' }]);
  });
});
