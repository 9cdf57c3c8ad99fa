import type { StemMeasurement } from '@/lib/schema/field';
import type { ProjectRecords } from '../_data/project-records';

/**
 * The stem whose value came last, to be read back: the one with the newest standing reading, be it a first entry or a later
 * change; among equals and without readings the last in the order of entry. Null without stems.
 */
export function lastEntered<T extends { readonly measurement: StemMeasurement }>(records: Pick<ProjectRecords, 'reading'>, stems: readonly T[]): T | null {
  const newest = ({ measurement: { dbhReadingIds, heightReadingIds } }: T): string =>
    [...dbhReadingIds, ...heightReadingIds].reduce((latest, id) => {
      const takenAt = records.reading.get(id)?.takenAt ?? '';
      return takenAt > latest ? takenAt : latest;
    }, '');
  return stems.reduce<{ readonly stem: T; readonly at: string } | null>((best, stem) => {
    const at = newest(stem);
    return best === null || at >= best.at ? { stem, at } : best;
  }, null)?.stem ?? null;
}
