import { plotSchema, speciesEntrySchema, stratumSchema } from '@/lib/schema/design';
import { projectSchema } from '@/lib/schema/project';
import type { RecordChange } from '@/lib/schema/record-change';
import { createChange } from './create-change';
import { DEMO_SEED } from './estate-truth';
import { hazardNote, wayInNote } from './plot-notes';
import { plannedPosition } from './planned-position';
import { seededRandom } from './seeded-random';

export const TRACT_NAME = 'Dunmorrow tract';
/** The species of the reference trees, as the import names it. */
export const TRACT_SPECIES = 'black cherry';

const UTM_ZONE = 17;
const DESIGNED_AT = Date.UTC(2026, 2, 16, 14, 0);
const FOOT_M = 0.3048;
/** International acre: 43,560 square feet. */
const ACRE_M2 = 43_560 * FOOT_M ** 2;
const strata = [
  { name: 'Hobble ridge', acres: 96, plots: 7, gate: 'the Hobble ridge bar gate' },
  { name: 'Coldwick hollow', acres: 71, plots: 5, gate: 'the Coldwick ford' },
] as const;

export type TractRecords = { readonly projectId: string; readonly design: readonly RecordChange[] };

/** The second project of the demo, in inches, feet and acres, with a dozen plots of a tenth of an acre and no earlier visits. */
export function tractRecords(seed: string = DEMO_SEED): TractRecords {
  const random = seededRandom(`${seed}/tract-design`);
  const projectId = random.id(DESIGNED_AT);
  const base = () => ({ id: random.id(DESIGNED_AT), projectId, deleted: false });
  const project = projectSchema.parse({
    id: projectId, projectId, deleted: false,
    name: TRACT_NAME, state: 'active', dbhUnit: 'in', lengthUnit: 'ft', areaUnit: 'ac', breastHeightM: 1.3716,
    dbhDecimals: 1, heightDecimals: 0, rounding: 'nearest', crs: `EPSG:326${UTM_ZONE}`,
    plotDesign: { kind: 'circle', areaM2: ACRE_M2 / 10, radiusM: Number((37.2 * FOOT_M).toFixed(5)) },
    alarmRatePer100: 1, tauSquared: 0.5, curveForm: 'curtis', expectationShown: 'on-request',
    emergencyNote: 'Emergency call 911. Signal on Hobble ridge only. Meeting point for the ambulance: the Hobble ridge bar gate.',
  });
  const species = [
    { code: 'BC', localName: TRACT_SPECIES, scientificName: 'Prunus serotina', curveGroup: TRACT_SPECIES, unknown: false },
    { code: 'UN', localName: 'unknown', scientificName: '', curveGroup: 'unknown', unknown: true },
  ].map((entry, position) => speciesEntrySchema.parse({ ...base(), ...entry, position }));
  const rows = strata.map(({ name, acres, plots, gate }, line) => {
    const stratum = stratumSchema.parse({ ...base(), name, areaHa: Number(((acres * ACRE_M2) / 10_000).toFixed(4)) });
    return {
      stratum,
      plots: Array.from({ length: plots }, (_, i) => plotSchema.parse({
        ...base(), stratumId: stratum.id, number: `${line === 0 ? 'R' : 'H'}${String(i + 1).padStart(2, '0')}`,
        ...plannedPosition(UTM_ZONE, 641_300 + i * 240, 4_610_500 + line * 240),
        wayIn: wayInNote(random, gate, 'ft'), hazardNote: hazardNote(random),
      })),
    };
  });
  return {
    projectId,
    design: [
      createChange('project', project),
      ...rows.map(({ stratum }) => createChange('stratum', stratum)),
      ...species.map((entry) => createChange('speciesEntry', entry)),
      ...rows.flatMap(({ plots }) => plots.map((plot) => createChange('plot', plot))),
    ],
  };
}
