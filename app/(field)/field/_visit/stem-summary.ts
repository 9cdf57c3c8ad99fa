import type { SpeciesEntry } from '@/lib/schema/design';
import type { StemMeasurement } from '@/lib/schema/field';
import { stemLabel } from '../_entry/next-entry';
import type { ProjectRecords } from '../_data/project-records';
import { formWords, statusWords } from '../_data/words';

export type StemSummary = {
  readonly measurement: StemMeasurement;
  readonly label: string;
  readonly species: SpeciesEntry | null;
  /** "25.3 cm", as typed; null where nothing stands. */
  readonly dbh: string | null;
  readonly height: string | null;
  /** "dead, broken", empty for a live whole stem. */
  readonly state: string;
  readonly openDoubts: number;
  readonly quiet: number;
};

/** A measured stem in the words and digits of the list. */
export function summariseStem(records: ProjectRecords, measurement: StemMeasurement): StemSummary {
  const stem = records.stem.get(measurement.stemId);
  const tree = stem && records.tree.get(stem.treeId);
  const looks = [...records.secondLook.values()].filter((look) => look.measurementId === measurement.id && !look.deleted && look.answer === 'open');
  const { dbhDigits, dbhUnit, heightDigits, heightUnit, status, form } = measurement;
  return {
    measurement,
    label: stemLabel(tree, stem),
    species: measurement.speciesId ? records.speciesEntry.get(measurement.speciesId) ?? null : null,
    dbh: dbhDigits === null ? null : `${dbhDigits} ${dbhUnit ?? ''}`,
    height: heightDigits === null ? null : `${heightDigits} ${heightUnit ?? ''}`,
    state: [status === 'live' ? '' : statusWords[status].toLowerCase(), form === 'whole' ? '' : formWords[form].toLowerCase()].filter(Boolean).join(', '),
    openDoubts: looks.filter(({ level }) => level === 'look').length,
    quiet: looks.filter(({ level }) => level === 'quiet').length,
  };
}

/** What is still to be filled in about a stem. */
export function missingWords({ dbh, height, species, measurement }: StemSummary): readonly string[] {
  const wantsHeight = measurement.status === 'live' && measurement.form === 'whole';
  return [species === null && 'species', dbh === null && 'DBH', height === null && wantsHeight && 'height'].filter((word) => word !== false);
}
