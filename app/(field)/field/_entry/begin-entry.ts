import type { Stem, StemMeasurement, Tree } from '@/lib/schema/field';
import type { EntryState } from './types';

export type NewEntryIds = { readonly tree: string; readonly stem: string; readonly measurement: string };

export type EntryPlace = {
  readonly projectId: string;
  readonly plotId: string;
  readonly visitId: string;
  readonly order: number;
};

/** Stems of a tree are a, b, c, …; most trees have one and are called by their tag alone. */
export const FIRST_STEM = 'a';

const blank = { readings: [], looks: [], focus: 'dbh', typing: null, goesOn: null, touched: false, panel: { kind: 'pad' }, unreadable: null } as const;

function newMeasurement(place: EntryPlace, stemId: string, id: string, speciesId: string | null): StemMeasurement {
  return {
    id, projectId: place.projectId, deleted: false, visitId: place.visitId, stemId, order: place.order, status: 'live', form: 'whole', speciesId,
    dbhDigits: null, dbhUnit: null, dbhCm: null, dbhReadingIds: [], heightDigits: null, heightUnit: null, heightM: null, heightReadingIds: [],
    heightMethod: null, remarks: '',
  };
}

/** A tree that nobody has measured before, with its first stem. */
export function beginNewTree(place: EntryPlace, tag: string, ids: NewEntryIds): EntryState {
  const base = { projectId: place.projectId, deleted: false };
  const tree: Tree = { ...base, id: ids.tree, plotId: place.plotId, firstVisitId: place.visitId, tag };
  const stem: Stem = { ...base, id: ids.stem, treeId: ids.tree, label: FIRST_STEM };
  return { ...blank, tree, stem, measurement: newMeasurement(place, ids.stem, ids.measurement, null), saved: { tree: false, stem: false, measurement: false } };
}

/** A stem of a tree that an earlier visit knows; its species is there, its values are not. */
export function beginKnownStem(place: EntryPlace, tree: Tree, stem: Stem, speciesId: string | null, measurementId: string): EntryState {
  return { ...blank, tree, stem, measurement: newMeasurement(place, stem.id, measurementId, speciesId), saved: { tree: true, stem: true, measurement: false } };
}

/** One stem more on the same tree, of the same species. */
export function beginAnotherStem(place: EntryPlace, tree: Tree, label: string, speciesId: string | null, ids: Omit<NewEntryIds, 'tree'>): EntryState {
  const stem: Stem = { projectId: place.projectId, deleted: false, id: ids.stem, treeId: tree.id, label };
  return { ...blank, tree, stem, measurement: newMeasurement(place, stem.id, ids.measurement, speciesId), saved: { tree: true, stem: false, measurement: false } };
}
