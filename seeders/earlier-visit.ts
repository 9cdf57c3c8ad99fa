import { readingSchema, stemMeasurementSchema, stemSchema, treeSchema, visitSchema } from '@/lib/schema/field';
import type { Reading, StemMeasurement } from '@/lib/schema/field';
import type { RecordChange } from '@/lib/schema/record-change';
import { createChange } from './create-change';
import type { DemoPeopleIds } from './demo-people';
import type { PlotTruth, StemTruth, TreeTruth } from './estate-forest';
import { seededRandom } from './seeded-random';

/** Repeat error of a diameter tape, cm. */
const TAPE_SD_CM = 0.15;
const SECOND_MS = 1000;

export type EarlierVisit = {
  readonly plotId: string;
  /** Who recorded it; the author of its changes. */
  readonly recorderId: string;
  /** Visit, trees, stems, measurements and readings, parents first. */
  readonly changes: readonly RecordChange[];
};

type Input = {
  readonly seed: string;
  readonly plot: PlotTruth;
  readonly yearsSince: number;
  readonly plotId: string;
  readonly projectId: string;
  readonly speciesIds: ReadonlyMap<string, string>;
  readonly people: DemoPeopleIds;
  /** Of the plot within the estate; spreads the visits over the season. */
  readonly index: number;
};

/**
 * Which stems have their height measured, as the protocol of the estate fixes it before anybody looks up: every tree with
 * an odd tag and the two thickest stems of the plot; of these the live ones that are neither broken nor leaning.
 */
function heightIsDue(tree: TreeTruth, stem: StemTruth, thickest: ReadonlySet<StemTruth>): boolean {
  return tree.status === 'live' && (tree.form === 'whole' || tree.form === 'forked') && (Number(tree.tag) % 2 === 1 || thickest.has(stem));
}

/** The visit that a crew of two made to a plot some seasons ago: measured in full and signed off. */
export function earlierVisit({ seed, plot, yearsSince, plotId, projectId, speciesIds, people, index }: Input): EarlierVisit {
  const random = seededRandom(`${seed}/earlier-visit/${plot.number}`);
  // Two plots a working day from mid-September on, the second after noon.
  const startMs = Date.UTC(2026 - yearsSince, 8, 14 + Math.floor(index / 4), index % 4 < 2 ? 7 : 11, random.whole(0, 50));
  let nowMs = startMs;
  const base = () => ({ id: random.id(nowMs), projectId, deleted: false });
  const time = () => new Date(nowMs).toISOString();
  const [measurerId, recorderId] = index % 4 < 2 ? [people.crewA, people.crewB] : [people.crewB, people.crewA];

  const visitBase = base();
  const stems = plot.trees.flatMap((tree) => tree.stems.flatMap((stem) => (stem.before ? [{ tree, stem, before: stem.before }] : [])));
  const thickest = new Set([...stems].sort((a, b) => b.before.dbhCm - a.before.dbhCm).slice(0, 2).map(({ stem }) => stem));

  const changes: RecordChange[] = [];
  const treeIds = new Map<TreeTruth, string>();
  stems.forEach(({ tree, stem, before }, position) => {
    nowMs += random.whole(35, 95) * SECOND_MS;
    let treeId = treeIds.get(tree);
    if (treeId === undefined) {
      const record = treeSchema.parse({ ...base(), plotId, firstVisitId: visitBase.id, tag: tree.tag });
      treeId = record.id;
      treeIds.set(tree, treeId);
      changes.push(createChange('tree', record));
    }
    const stemRecord = stemSchema.parse({ ...base(), treeId, label: stem.label });
    const measurementBase = base();
    const read = (quantity: 'dbh' | 'height', value: number): Reading => {
      // As typed: one decimal in both fields of this project; the canonical units are the project's own, so nothing is converted.
      const digits = value.toFixed(1);
      nowMs += random.whole(4, 20) * SECOND_MS;
      return readingSchema.parse({
        ...base(), measurementId: measurementBase.id, quantity, digits, unit: quantity === 'dbh' ? 'cm' : 'm', canonical: Number(digits), origin: 'first',
        instrument: quantity === 'dbh' ? 'diameter tape' : 'hypsometer', measurerId, recorderId, takenAt: time(),
      });
    };
    const dbh = read('dbh', Math.max(7, before.dbhCm + TAPE_SD_CM * random.normal()));
    const height = heightIsDue(tree, stem, thickest) ? read('height', before.heightM) : null;
    const measurement: StemMeasurement = stemMeasurementSchema.parse({
      ...measurementBase, visitId: visitBase.id, stemId: stemRecord.id, order: position + 1, status: tree.status, form: tree.form,
      speciesId: speciesIds.get(tree.speciesCode), dbhDigits: dbh.digits, dbhUnit: 'cm', dbhCm: dbh.canonical, dbhReadingIds: [dbh.id],
      heightDigits: height?.digits ?? null, heightUnit: height ? 'm' : null, heightM: height?.canonical ?? null,
      heightReadingIds: height ? [height.id] : [], heightMethod: height ? 'measured' : null, remarks: '',
    });
    changes.push(
      createChange('stem', stemRecord), createChange('stemMeasurement', measurement), createChange('reading', dbh),
      ...(height ? [createChange('reading', height)] : []),
    );
  });

  nowMs += 300 * SECOND_MS;
  const empty = stems.length === 0;
  const visit = visitSchema.parse({
    ...visitBase, plotId, kind: 'production', startedAt: new Date(startMs).toISOString(), measurerId, recorderId, state: 'signedOff',
    outcome: empty ? 'no-trees' : 'full', outcomeNote: empty ? 'Windthrow cleared, only regeneration below the threshold.' : '', finishedAt: time(),
  });
  return { plotId, recorderId, changes: [createChange('visit', visit), ...changes] };
}
