import { z } from 'zod';
import { dbhUnitSchema, lengthUnitSchema } from '@/lib/schema/common';
import { Problem } from '@/lib/server/errors';
import { importReferenceTrees } from '@/lib/server/imports/import-reference-trees';
import { MOST_BYTES } from '@/lib/server/imports/read-table';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { listImports } from '@/lib/server/imports/list-imports';
import { route } from '@/lib/server/route';

const column = z.string().trim().max(200);
const uploadSchema = z.object({
  file: z.instanceof(File, { message: 'Choose a CSV file.' }),
  dbhUnit: dbhUnitSchema, lengthUnit: lengthUnitSchema,
  dbh: column.min(1, 'Say which column holds the DBH.'), height: column.min(1, 'Say which column holds the height.'),
  species: column.default(''), defaultSpecies: column.default(''), plot: column.default(''), note: z.string().max(1000).default(''),
});

/** Files of reference trees taken so far. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, async ({ params }) => ({ imports: await listImports(params.projectId) }));

/** Takes a CSV file of reference trees, all rows or none. */
export const POST = route(
  { access: { action: 'data.import', project: projectOf }, params: projectParams, body: uploadSchema, bodyKind: 'form', maxBodyBytes: MOST_BYTES + 65_536 },
  async ({ params, body, user }) => {
    const { file, dbhUnit, lengthUnit, dbh, height, species, defaultSpecies, plot, note } = body;
    const result = await importReferenceTrees({
      projectId: params.projectId, authorId: user.id, fileName: file.name, bytes: new Uint8Array(await file.arrayBuffer()), dbhUnit, lengthUnit, note,
      columns: { dbh, height, ...(species === '' ? {} : { species }), ...(plot === '' ? {} : { plot }) }, ...(defaultSpecies === '' ? {} : { defaultSpecies }),
    });
    if (result.ok) return { batchId: result.batchId, rows: result.rows };
    const units = result.issues.some(({ column: name }) => name === 'dbhUnit' || name === 'lengthUnit');
    throw new Problem(units ? 'wrong-unit' : 'invalid-fields', {
      detail: 'Nothing of the file was taken.',
      issues: result.issues.map(({ row, column: name, message }) => ({ field: ['file', row === null ? '' : `line ${row}`, name ?? ''].filter(Boolean).join(', '), message })),
    });
  },
);
