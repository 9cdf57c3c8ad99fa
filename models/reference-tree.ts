import type { Model, ModelStatic, Sequelize } from 'sequelize';
import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import { integer, primaryId, real, tableOptions, text, textOrNull } from './columns';

/** A tree measured elsewhere or earlier, on which curves are fitted. Values as written and canonical (cm, m). */
export type ReferenceTreeRow = {
  id: string;
  projectId: string;
  batchId: string;
  /** Line of the file, the header being 1. */
  row: number;
  speciesId: string;
  plotLabel: string | null;
  dbhDigits: string;
  dbhUnit: DbhUnit;
  dbhCm: number;
  heightDigits: string;
  heightUnit: LengthUnit;
  heightM: number;
};
export type ReferenceTreeInstance = Model<ReferenceTreeRow, ReferenceTreeRow> & ReferenceTreeRow;

export function defineReferenceTree(sequelize: Sequelize): ModelStatic<ReferenceTreeInstance> {
  return sequelize.define<ReferenceTreeInstance>(
    'ReferenceTree',
    {
      id: primaryId(),
      projectId: text(),
      batchId: text(),
      row: integer(),
      speciesId: text(),
      plotLabel: textOrNull(),
      dbhDigits: text(),
      dbhUnit: text(),
      dbhCm: real(),
      heightDigits: text(),
      heightUnit: text(),
      heightM: real(),
    },
    tableOptions('reference_trees'),
  );
}
