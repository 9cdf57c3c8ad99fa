import type { Model, ModelStatic, Sequelize } from 'sequelize';
import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import { integer, primaryId, tableOptions, text } from './columns';

/** One file of reference trees as it came in, with the units stated for it. */
export type ImportBatchRow = {
  id: string;
  projectId: string;
  fileName: string;
  /** Of the bytes of the file, lower-case hex. */
  sha256: string;
  rows: number;
  dbhUnit: DbhUnit;
  lengthUnit: LengthUnit;
  importedById: string;
  importedAt: string;
  note: string;
};
export type ImportBatchInstance = Model<ImportBatchRow, ImportBatchRow> & ImportBatchRow;

export function defineImportBatch(sequelize: Sequelize): ModelStatic<ImportBatchInstance> {
  return sequelize.define<ImportBatchInstance>(
    'ImportBatch',
    {
      id: primaryId(),
      projectId: text(),
      fileName: text(),
      sha256: text(),
      rows: integer(),
      dbhUnit: text(),
      lengthUnit: text(),
      importedById: text(),
      importedAt: text(),
      note: text(),
    },
    tableOptions('import_batches'),
  );
}
