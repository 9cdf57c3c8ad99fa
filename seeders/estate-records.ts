import { plotSchema, speciesEntrySchema, stratumSchema } from '@/lib/schema/design';
import { projectSchema } from '@/lib/schema/project';
import type { RecordChange } from '@/lib/schema/record-change';
import type { DemoPeopleIds } from './demo-people';
import { earlierVisit } from './earlier-visit';
import type { EarlierVisit } from './earlier-visit';
import { ESTATE_NAME, estateSpecies, estateStrata } from './estate-places';
import { DEMO_SEED, estateTruth } from './estate-truth';
import { hazardNote, wayInNote } from './plot-notes';
import { plannedPosition } from './planned-position';
import { createChange } from './create-change';
import { seededRandom } from './seeded-random';

const UTM_ZONE = 33;
/** South-west corner of the grid, and its spacing: each plot stands for 280 m × 280 m. */
const GRID = { eastingM: 441_140, northingM: 5_481_220, spacingM: 280, rows: 6 } as const;
const DESIGNED_AT = Date.UTC(2023, 4, 8, 7, 30);

export type EstateRecords = {
  readonly projectId: string;
  /** Project, strata, species and plots, parents first. */
  readonly design: readonly RecordChange[];
  readonly visits: readonly EarlierVisit[];
};

/** All records of the estate as a seed makes them, parsed by their schemas. The same seed and people give the same records. */
export function estateRecords(people: DemoPeopleIds, seed: string = DEMO_SEED): EstateRecords {
  const truth = estateTruth(seed);
  const random = seededRandom(`${seed}/estate-design`);
  const projectId = random.id(DESIGNED_AT);
  const base = () => ({ id: random.id(DESIGNED_AT), projectId, deleted: false });

  const project = projectSchema.parse({
    id: projectId, projectId, deleted: false,
    name: ESTATE_NAME, state: 'active', dbhUnit: 'cm', lengthUnit: 'm', areaUnit: 'ha', breastHeightM: truth.breastHeightM,
    dbhDecimals: 1, heightDecimals: 1, rounding: 'nearest', crs: `EPSG:326${UTM_ZONE}`,
    plotDesign: { kind: 'circle', areaM2: truth.plotAreaHa * 10_000, radiusM: 11.2838 },
    alarmRatePer100: 1, tauSquared: truth.tauSquared, curveForm: 'curtis', expectationShown: 'on-request',
    emergencyNote: 'Emergency call 112. No signal in Merrin bottom: the nearest is at the Tarnholt gate, by the notice board. '
      + 'Meeting point for the ambulance: Merrin mill bridge. Say "Velmarrow estate" and the number on the road post.',
  });
  const strata = estateStrata.map(({ name, areaHa }) => stratumSchema.parse({ ...base(), name, areaHa }));
  const species = estateSpecies.map((entry, position) => speciesEntrySchema.parse({ ...base(), ...entry, position }));
  const speciesIds = new Map(species.map(({ code, id }) => [code, id]));
  const plots = truth.plots.map(({ number, stratum }, index) => {
    const column = Math.floor(index / GRID.rows);
    // Column by column, up and down in turn, so that each stratum hangs together.
    const row = column % 2 === 0 ? index % GRID.rows : GRID.rows - 1 - (index % GRID.rows);
    return plotSchema.parse({
      ...base(), stratumId: strata[stratum]!.id, number,
      ...plannedPosition(UTM_ZONE, GRID.eastingM + column * GRID.spacingM, GRID.northingM + row * GRID.spacingM),
      wayIn: wayInNote(random, estateStrata[stratum]!.gate, 'm'), hazardNote: hazardNote(random),
    });
  });

  return {
    projectId,
    design: [
      createChange('project', project),
      ...strata.map((stratum) => createChange('stratum', stratum)),
      ...species.map((entry) => createChange('speciesEntry', entry)),
      ...plots.map((plot) => createChange('plot', plot)),
    ],
    visits: truth.plots.flatMap((plot, index) =>
      (plot.yearsSince === null ? [] : [earlierVisit({ seed, plot, yearsSince: plot.yearsSince, plotId: plots[index]!.id, projectId, speciesIds, people, index })])),
  };
}
