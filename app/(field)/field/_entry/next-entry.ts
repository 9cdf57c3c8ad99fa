import type { Stem, StemMeasurement, Tree } from '@/lib/schema/field';
import type { ProjectRecords } from '../_data/project-records';
import { FIRST_STEM, beginAnotherStem, beginKnownStem, beginNewTree } from './begin-entry';
import type { EntryPlace } from './begin-entry';
import type { EntryState } from './types';

const byNumber = new Intl.Collator('en', { numeric: true });

export type KnownStem = { readonly tree: Tree; readonly stem: Stem; readonly speciesId: string | null; readonly label: string };

/** A stem as it is called: "12", or "12b" for the second stem of a tree. */
export function stemLabel(tree: Tree | undefined, stem: Stem | undefined): string {
  const tag = tree?.tag ?? '?';
  return stem && stem.label !== FIRST_STEM ? `${tag}${stem.label}` : tag;
}

/** The label after the highest in use: a, b, … z, then numbers. */
function nextStemLabel(labels: readonly string[]): string {
  const letters = labels.filter((label) => /^[a-z]$/.test(label)).map((label) => label.charCodeAt(0));
  const code = Math.max(FIRST_STEM.charCodeAt(0), ...letters) + 1;
  return code <= 'z'.charCodeAt(0) ? String.fromCharCode(code) : String(labels.length + 1);
}

function lastSpecies(measurements: readonly StemMeasurement[]): string | null {
  return measurements.findLast(({ speciesId }) => speciesId !== null)?.speciesId ?? null;
}

/** Stems of the plot that an earlier visit knows and this one has not measured, by tag. */
export function knownStems(records: ProjectRecords, plotId: string, visitId: string): readonly KnownStem[] {
  const byStem = new Map<string, StemMeasurement[]>();
  for (const measurement of records.stemMeasurement.values()) {
    if (!measurement.deleted) byStem.set(measurement.stemId, [...(byStem.get(measurement.stemId) ?? []), measurement]);
  }
  return [...records.stem.values()].flatMap((stem) => {
    const tree = records.tree.get(stem.treeId);
    const measured = byStem.get(stem.id) ?? [];
    if (stem.deleted || !tree || tree.deleted || tree.plotId !== plotId || tree.firstVisitId === visitId) return [];
    if (measured.length === 0 || measured.some((measurement) => measurement.visitId === visitId)) return [];
    return [{ tree, stem, speciesId: lastSpecies(measured), label: stemLabel(tree, stem) }];
  }).sort((a, b) => byNumber.compare(a.label, b.label));
}

/** The next free tag: one more than the highest number ever used on the plot, deleted trees included. */
export function nextTag(records: ProjectRecords, plotId: string): string {
  const numbers = [...records.tree.values()].filter((tree) => tree.plotId === plotId).map(({ tag }) => Number.parseInt(tag, 10));
  return String(Math.max(0, ...numbers.filter(Number.isFinite)) + 1);
}

function placeOf(records: ProjectRecords, visit: { id: string; projectId: string; plotId: string }): EntryPlace {
  const orders = [...records.stemMeasurement.values()].filter(({ visitId }) => visitId === visit.id).map(({ order }) => order);
  return { projectId: visit.projectId, plotId: visit.plotId, visitId: visit.id, order: Math.max(0, ...orders) + 1 };
}

type Visited = { readonly id: string; readonly projectId: string; readonly plotId: string };

/** A new tree on the card. */
export function newTreeEntry(records: ProjectRecords, visit: Visited, newId: () => string): EntryState {
  return beginNewTree(placeOf(records, visit), nextTag(records, visit.plotId), { tree: newId(), stem: newId(), measurement: newId() });
}

/** A stem that an earlier visit knows. */
export function knownStemEntry(records: ProjectRecords, visit: Visited, { tree, stem, speciesId }: KnownStem, newId: () => string): EntryState {
  return beginKnownStem(placeOf(records, visit), tree, stem, speciesId, newId());
}

/** What comes to the card by itself: the next known stem by tag, else a new tree. */
export function nextEntry(records: ProjectRecords, visit: Visited, newId: () => string): EntryState {
  const [known] = knownStems(records, visit.plotId, visit.id);
  return known ? knownStemEntry(records, visit, known, newId) : newTreeEntry(records, visit, newId);
}

/** One stem more on a tree. */
export function anotherStemEntry(records: ProjectRecords, visit: Visited, from: EntryState, newId: () => string): EntryState {
  const label = nextStemLabel([...records.stem.values()].filter(({ treeId }) => treeId === from.tree.id).map((stem) => stem.label));
  return beginAnotherStem(placeOf(records, visit), from.tree, label, from.measurement.speciesId, { stem: newId(), measurement: newId() });
}

/** A measured stem back on the card, with all its readings and doubts; null when it is not there. */
export function storedEntry(records: ProjectRecords, measurementId: string): EntryState | null {
  const measurement = records.stemMeasurement.get(measurementId);
  const stem = measurement && records.stem.get(measurement.stemId);
  const tree = stem && records.tree.get(stem.treeId);
  if (!measurement || !tree) return null;
  const mine = <T extends { measurementId: string; deleted: boolean }>(all: ReadonlyMap<string, T>) => [...all.values()].filter((one) => one.measurementId === measurementId && !one.deleted);
  const looks = mine(records.secondLook).sort((a, b) => (a.raisedAt < b.raisedAt ? -1 : 1));
  const question = looks.find(({ answer, level }) => answer === 'open' && level === 'look');
  return {
    tree, stem, measurement, saved: { tree: true, stem: true, measurement: true }, readings: mine(records.reading), looks, typing: null, goesOn: null, touched: false,
    focus: measurement.dbhDigits !== null && measurement.heightDigits === null ? 'height' : 'dbh',
    panel: question ? { kind: 'doubt', lookId: question.id } : { kind: 'pad' }, unreadable: null,
  };
}

/** An entry whose records were made and then undone: what is typed again makes records with ids of their own. */
export function withNewIds(state: EntryState, newId: () => string): EntryState {
  const { saved } = state;
  if (saved.measurement) return state;
  const tree = saved.tree ? state.tree : { ...state.tree, id: newId() };
  const stem = saved.stem ? state.stem : { ...state.stem, id: newId(), treeId: tree.id };
  return { ...state, tree, stem, measurement: { ...state.measurement, id: newId(), stemId: stem.id } };
}
