import type { Sequelize } from 'sequelize';
import { flag, integer, recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `species_entries`; fields as in the `speciesEntry` schema. */
export function defineSpeciesEntry(sequelize: Sequelize): SyncedModel<'speciesEntry'> {
  return sequelize.define<SyncedInstance<'speciesEntry'>>(
    'SpeciesEntry',
    {
      ...recordColumns(),
      code: text(),
      localName: text(),
      scientificName: text(),
      curveGroup: text(),
      unknown: flag(),
      position: integer(),
    },
    tableOptions('species_entries'),
  );
}
