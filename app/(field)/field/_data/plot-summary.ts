import type { Plot, Stratum } from '@/lib/schema/design';
import type { SecondLook, StemMeasurement, Visit } from '@/lib/schema/field';
import type { ProjectRecords } from './project-records';
import { outcomeWords } from './words';

export type PlotSummary = {
  readonly plot: Plot;
  readonly stratum: Stratum | null;
  /** The visit that is open on the plot. */
  readonly open: Visit | null;
  /** The last visit that has ended. */
  readonly last: Visit | null;
  readonly trees: number;
  readonly doubts: number;
  readonly state: 'not-started' | 'open' | 'finished';
  readonly words: string;
};

const byStart = (a: Visit, b: Visit) => (a.startedAt < b.startedAt ? -1 : 1);
const numberOrder = new Intl.Collator('en', { numeric: true });

/** Visits of each plot, the oldest first, deleted ones left out. */
export function visitsByPlot(records: ProjectRecords): ReadonlyMap<string, readonly Visit[]> {
  const found = new Map<string, Visit[]>();
  for (const visit of records.visit.values()) {
    if (visit.deleted) continue;
    found.set(visit.plotId, [...(found.get(visit.plotId) ?? []), visit]);
  }
  for (const visits of found.values()) visits.sort(byStart);
  return found;
}

/** Measurements of a visit in order of entry. */
export function measurementsOf(records: ProjectRecords, visitId: string, deleted = false): readonly StemMeasurement[] {
  return [...records.stemMeasurement.values()]
    .filter((measurement) => measurement.visitId === visitId && measurement.deleted === deleted)
    .sort((a, b) => a.order - b.order || (a.id < b.id ? -1 : 1));
}

/** Doubts of a visit that still want an answer, in the order of entry of their stems. */
export function openLooksOf(records: ProjectRecords, visitId: string): readonly SecondLook[] {
  const order = new Map(measurementsOf(records, visitId).map(({ id, order: place }) => [id, place]));
  return [...records.secondLook.values()]
    .filter((look) => look.visitId === visitId && !look.deleted && look.answer === 'open' && look.level === 'look' && order.has(look.measurementId))
    .sort((a, b) => order.get(a.measurementId)! - order.get(b.measurementId)! || (a.raisedAt < b.raisedAt ? -1 : 1));
}

/** Number of trees (not stems) of a visit. */
export function treeCount(records: ProjectRecords, visitId: string): number {
  return new Set(measurementsOf(records, visitId).map(({ stemId }) => records.stem.get(stemId)?.treeId ?? stemId)).size;
}

/**
 * How a plot stands, with its state in words. A visit of before this round (finished, signed off) counts as earlier
 * unless it was finished after `since`.
 */
export function summarisePlot(records: ProjectRecords, plot: Plot, visits: readonly Visit[], since: string): PlotSummary {
  const open = visits.findLast(({ state }) => state === 'open' || state === 'sentBack') ?? null;
  const last = visits.findLast(({ state }) => state === 'finished' || state === 'signedOff') ?? null;
  const current = last !== null && last.startedAt >= since;
  const trees = open ? treeCount(records, open.id) : 0;
  const counted = open ?? (current ? last : null);
  const doubts = counted ? openLooksOf(records, counted.id).length : 0;
  const state = open ? 'open' : current ? 'finished' : 'not-started';
  const words = open ? `Open, ${trees} ${trees === 1 ? 'tree' : 'trees'}`
    : current && last.outcome ? `Finished, ${outcomeWords[last.outcome].toLowerCase()}` : 'Not started';
  return { plot, stratum: records.stratum.get(plot.stratumId) ?? null, open, last, trees, doubts, state, words };
}

/** All plots by number, as their crews count: 2 before 10. */
export function summarisePlots(records: ProjectRecords, since: string): readonly PlotSummary[] {
  const visits = visitsByPlot(records);
  return [...records.plot.values()].filter(({ deleted }) => !deleted)
    .sort((a, b) => numberOrder.compare(a.number, b.number))
    .map((plot) => summarisePlot(records, plot, visits.get(plot.id) ?? [], since));
}
