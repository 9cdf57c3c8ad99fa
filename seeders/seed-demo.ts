import 'server-only';
import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { addMembership } from '@/lib/server/add-membership';
import { createUser } from '@/lib/server/create-user';
import { fitAndPublishCurves } from '@/lib/server/curves/fit-and-publish';
import { importReferenceTrees } from '@/lib/server/imports/import-reference-trees';
import { recordChanges } from '@/lib/server/log/record-changes';
import { write } from '@/lib/server/write-queue';
import { openDatabase } from '@/models';
import { demoPeople } from './demo-people';
import type { DemoPeopleIds } from './demo-people';
import type { DemoProject, DemoSummary } from './demo-summary';
import { ESTATE_NAME } from './estate-places';
import { estateRecords } from './estate-records';
import { DEMO_SEED } from './estate-truth';
import { TRACT_NAME, TRACT_SPECIES, tractRecords } from './tract-records';

/** Marks a database as a demo: `sowing` until all of it stands, then `sown`. */
const MARK = 'demo';
const CHERRY_FILE = 'black-cherry.csv';
const cherryPath = path.join(path.dirname(fileURLToPath(import.meta.url)), 'data', CHERRY_FILE);

async function setMark(value: 'sowing' | 'sown'): Promise<void> {
  await write(({ models, transaction }) => models.ServerMeta.upsert({ key: MARK, value }, { transaction }));
}

/** The people's ids. Those who are there already, from a start that was cut short, stay. */
async function ensurePeople(): Promise<DemoPeopleIds> {
  const { models } = await openDatabase();
  const entries = await Promise.all(demoPeople.map(async ({ key, name, email, password, admin }) => {
    const known = await models.User.findOne({ where: { email } });
    return [key, known?.id ?? (await createUser({ name, email, password, admin })).id] as const;
  }));
  return Object.fromEntries(entries) as DemoPeopleIds;
}

async function isThere(projectId: string): Promise<boolean> {
  const { models } = await openDatabase();
  return (await models.Project.count({ where: { id: projectId } })) > 0;
}

/** All records of the estate in one transaction: the design by the analyst, each visit by who recorded it. */
async function sowEstate(people: DemoPeopleIds, seed: string): Promise<string> {
  const { projectId, design, visits } = estateRecords(people, seed);
  if (await isThere(projectId)) return projectId;
  await write(async (context) => {
    await recordChanges(context, design, { projectId, authorId: people.analyst, reason: 'demo' });
    for (const recorderId of new Set(visits.map((visit) => visit.recorderId))) {
      const changes = visits.filter((visit) => visit.recorderId === recorderId).flatMap((visit) => visit.changes);
      await recordChanges(context, changes, { projectId, authorId: recorderId, reason: 'demo' });
    }
  });
  return projectId;
}

async function sowTract(people: DemoPeopleIds, seed: string): Promise<string> {
  const { projectId, design } = tractRecords(seed);
  if (!(await isThere(projectId))) await write((context) => recordChanges(context, design, { projectId, authorId: people.analyst, reason: 'demo' }));
  return projectId;
}

/** The 31 black cherry trees, by the same function as an upload or the import command. */
async function importCherries(projectId: string, authorId: string): Promise<void> {
  const { models } = await openDatabase();
  if ((await models.ImportBatch.count({ where: { projectId } })) > 0) return;
  const imported = await importReferenceTrees({
    projectId, authorId, fileName: CHERRY_FILE, bytes: await readFile(cherryPath),
    columns: { dbh: 'Girth', height: 'Height' }, defaultSpecies: TRACT_SPECIES, dbhUnit: 'in', lengthUnit: 'ft',
    note: 'Ryan, Joiner and Ryan 1976, 31 felled black cherry trees. The column Girth holds diameters in inches.',
  });
  if (!imported.ok) throw new Error(`The shipped ${CHERRY_FILE} was refused: ${JSON.stringify(imported)}`);
}

async function publishOnce(projectId: string, authorId: string): Promise<void> {
  const { models } = await openDatabase();
  if ((await models.HeightCurve.count({ where: { projectId } })) > 0) return;
  await fitAndPublishCurves({ projectId, authorId });
}

/** Whether this database is a demo (being sown or sown), empty, or something else. */
async function stateOfDatabase(): Promise<'empty' | 'sowing' | 'sown' | 'foreign'> {
  const { models } = await openDatabase();
  const mark = await models.ServerMeta.findByPk(MARK);
  if (mark) return mark.value === 'sown' ? 'sown' : 'sowing';
  const used = (await models.User.count()) + (await models.Project.count());
  return used === 0 ? 'empty' : 'foreign';
}

/**
 * Sows the demo into an empty database: people, the estate with its earlier visits, the tract with its reference trees, and
 * the curves of both by the same functions that the office uses. A sowing that was cut short is finished; a database that
 * holds anything else is left alone.
 */
export async function seedDemo(seed: string = DEMO_SEED): Promise<DemoSummary> {
  const before = await stateOfDatabase();
  if (before === 'foreign') return { state: 'foreign' };
  if (before !== 'sown') {
    await setMark('sowing');
    const people = await ensurePeople();
    const estateId = await sowEstate(people, seed);
    const tractId = await sowTract(people, seed);
    for (const { key, estateRole, tractRole } of demoPeople) {
      if (estateRole) await addMembership({ userId: people[key], projectId: estateId, role: estateRole });
      if (tractRole) await addMembership({ userId: people[key], projectId: tractId, role: tractRole });
    }
    await importCherries(tractId, people.analyst);
    await publishOnce(estateId, people.analyst);
    await publishOnce(tractId, people.analyst);
    await setMark('sown');
  }
  const { models } = await openDatabase();
  const rows = await models.Project.findAll({ where: { name: [ESTATE_NAME, TRACT_NAME] } });
  const describes: Readonly<Record<string, string>> = {
    [ESTATE_NAME]: 'cm, m, ha; 60 plots of 400 m² in 4 strata, half of them measured before',
    [TRACT_NAME]: 'in, ft, ac; 12 plots of a tenth of an acre, curve from 31 black cherry trees',
  };
  const projects: DemoProject[] = rows.map(({ id, name }) => ({ id, name, describes: describes[name] ?? '' }));
  return { state: before === 'sown' ? 'kept' : 'sown', people: demoPeople, projects };
}
