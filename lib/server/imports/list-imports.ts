import 'server-only';
import { openDatabase } from '@/models';

export type ListedImport = { readonly id: string; readonly fileName: string; readonly rows: number; readonly dbhUnit: string; readonly lengthUnit: string; readonly importedAt: string; readonly importedBy: string; readonly note: string };

/** Files of reference trees taken into a project, newest first. */
export async function listImports(projectId: string): Promise<readonly ListedImport[]> {
  const { models } = await openDatabase();
  const [batches, users] = await Promise.all([models.ImportBatch.findAll({ where: { projectId }, order: [['importedAt', 'DESC']] }), models.User.findAll({ attributes: ['id', 'name'] })]);
  const names = new Map(users.map(({ id, name }) => [id, name]));
  return batches.map(({ id, fileName, rows, dbhUnit, lengthUnit, importedAt, importedById, note }) => ({ id, fileName, rows, dbhUnit, lengthUnit, importedAt, note, importedBy: names.get(importedById) ?? '' }));
}
