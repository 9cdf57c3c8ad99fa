import { v7 } from 'uuid';
import type { Screen } from '@/lib/checks/types';
import type { SpeciesEntry } from '@/lib/schema/design';
import type { Visit } from '@/lib/schema/field';
import type { Project } from '@/lib/schema/project';
import { parseDigits } from '@/lib/trees/parse-digits';
import { toCanonicalCm, toCanonicalM } from '@/lib/trees/units';
import type { EntryPorts } from './types';

type Input = {
  readonly project: Project;
  readonly visit: Pick<Visit, 'measurerId' | 'recorderId'>;
  readonly species: ReadonlyMap<string, SpeciesEntry>;
  readonly authorId: string;
  readonly screen: Screen;
};

/** The entry's view of the world as it is: the clock, new ids, the project's units, the checks. */
export function entryPorts({ project, visit, species, authorId, screen }: Input): EntryPorts {
  return {
    newId: () => v7(),
    now: () => new Date().toISOString(),
    authorId, measurerId: visit.measurerId, recorderId: visit.recorderId,
    dbhUnit: project.dbhUnit, lengthUnit: project.lengthUnit,
    parse: (digits) => {
      const parsed = parseDigits(digits);
      return parsed.kind === 'value' ? parsed.value : null;
    },
    canonical: (quantity, value) => (quantity === 'dbh' ? toCanonicalCm(value, project.dbhUnit) : toCanonicalM(value, project.lengthUnit)),
    curveGroup: (speciesId) => (speciesId === null ? null : species.get(speciesId)?.curveGroup ?? null),
    check: (stem) => screen.screen(stem),
  };
}
