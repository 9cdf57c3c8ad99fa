import 'server-only';
import { fitAndPublishCurves } from '@/lib/server/curves/fit-and-publish';
import { importReferenceTrees } from '@/lib/server/imports/import-reference-trees';
import { openDatabase } from '@/models';
import type { Models } from '@/models';
import type { ImportArguments } from './parse-import-arguments';

export type ImportReport = { readonly ok: boolean; readonly lines: readonly string[] };

const refused = (...lines: string[]): ImportReport => ({ ok: false, lines });

async function findProject(models: Models, nameOrId: string) {
  const projects = await models.Project.findAll({ where: { deleted: false }, order: ['name'] });
  const found = projects.filter(({ id, name }) => id === nameOrId || name.toLowerCase() === nameOrId.trim().toLowerCase());
  const [first, second] = found;
  if (first && !second) return first;
  if (second) return refused(`${found.length} projects are called "${nameOrId}". Name one by its id:`, ...found.map(({ id, name }) => `  ${id}  ${name}`));
  return refused(`There is no project "${nameOrId}".`, projects.length === 0 ? 'There are no projects.' : 'The projects are:', ...projects.map(({ name }) => `  ${name}`));
}

async function findAuthor(models: Models, email: string | null) {
  const user = email === null
    ? await models.User.findOne({ where: { admin: true, disabled: false }, order: ['createdAt', 'id'] })
    : await models.User.findOne({ where: { email: email.trim().toLowerCase(), disabled: false } });
  return user ?? refused(email === null ? 'There is no administrator to import as: name a person with --by EMAIL.' : `There is nobody with the address ${email}.`);
}

/** Takes the trees of a file into a project, and publishes their curves where that was asked for. Every line is for a person. */
export async function runImport(given: ImportArguments, file: { fileName: string; bytes: Uint8Array }): Promise<ImportReport> {
  const { models } = await openDatabase();
  const project = await findProject(models, given.project);
  if ('lines' in project) return project;
  const author = await findAuthor(models, given.by);
  if ('lines' in author) return author;
  // The importer refuses them too; here the words can say which option to change.
  const faults = [
    ...(given.dbhUnit === project.dbhUnit ? [] : [`--dbh-unit: project "${project.name}" measures DBH in ${project.dbhUnit}, not in ${given.dbhUnit}. Nothing is converted.`]),
    ...(given.lengthUnit === project.lengthUnit ? [] : [`--height-unit: project "${project.name}" measures heights in ${project.lengthUnit}, not in ${given.lengthUnit}. Nothing is converted.`]),
  ];
  if (faults.length > 0) return refused(...faults);

  const { dbh, height, species, plot } = given.columns;
  const imported = await importReferenceTrees({
    projectId: project.id, authorId: author.id, fileName: file.fileName, bytes: file.bytes, dbhUnit: given.dbhUnit, lengthUnit: given.lengthUnit, note: given.note,
    columns: { dbh, height, ...(species === null ? {} : { species }), ...(plot === null ? {} : { plot }) },
    ...(given.speciesName === null ? {} : { defaultSpecies: given.speciesName }),
  });
  if (!imported.ok) return refused(`Nothing of ${file.fileName} was taken:`, ...imported.issues.map(({ row, message }) => `  line ${row}: ${message}`));
  const lines = [`Took ${imported.rows} trees from ${file.fileName} into "${project.name}".`];
  if (!given.publish) return { ok: true, lines };
  const published = await fitAndPublishCurves({ projectId: project.id, authorId: author.id, ...(given.form === null ? {} : { form: given.form }) });
  return { ok: true, lines: [...lines, ...published.map(({ curveGroup, form, version, n }) => `Published ${form} curve of ${curveGroup}, version ${version}, ${n} trees.`)] };
}
