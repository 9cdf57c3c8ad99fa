// npm run add-person: a person who may sign in, as administrator of the server or as a member of a project.
import { pathToFileURL } from 'node:url';
import { createInterface } from 'node:readline/promises';
import { parseArgs } from 'node:util';
import { roleSchema } from '@/lib/schema/common';
import { addMembership } from '@/lib/server/add-membership';
import { UserRefusedError, createUser } from '@/lib/server/create-user';
import { closeDatabase, openDatabase } from '@/models';

export const ADD_PERSON_USAGE = `Usage: npm run add-person -- --email ADDRESS --name "FULL NAME" [--admin] [--project NAME --role crew|lead|analyst]
The password (at least 12 characters) is asked for, or taken from LAMMAS_PASSWORD. For somebody who is there already, only the membership is added.`;

async function password(): Promise<string> {
  const given = process.env.LAMMAS_PASSWORD;
  if (given !== undefined) return given;
  const lines = createInterface({ input: process.stdin, output: process.stdout });
  try {
    return await lines.question('Password: ');
  } finally {
    lines.close();
  }
}

async function main(): Promise<number> {
  const options = { email: { type: 'string' }, name: { type: 'string' }, admin: { type: 'boolean', default: false }, project: { type: 'string' }, role: { type: 'string' } } as const;
  let values;
  try {
    ({ values } = parseArgs({ options }));
  } catch (error) {
    console.error(`${error instanceof Error ? error.message : String(error)}\n\n${ADD_PERSON_USAGE}`);
    return 2;
  }
  const { email, name, admin, project: projectName } = values;
  const role = values.role === undefined ? null : roleSchema.safeParse(values.role);
  if (!email || (projectName === undefined) !== (role === null) || role?.success === false) {
    console.error(ADD_PERSON_USAGE);
    return 2;
  }
  const { models } = await openDatabase();
  const project = projectName === undefined ? null : await models.Project.findOne({ where: { name: projectName, deleted: false } });
  if (projectName !== undefined && !project) {
    const names = (await models.Project.findAll({ where: { deleted: false }, order: ['name'] })).map((row) => row.name);
    console.error(`There is no project "${projectName}". ${names.length === 0 ? 'There are none yet.' : `There are: ${names.join(', ')}.`}`);
    return 1;
  }
  const known = await models.User.findOne({ where: { email: email.trim().toLowerCase() } });
  if (!known && !name) {
    console.error(`Nobody has the address ${email} yet: give a --name too.`);
    return 2;
  }
  try {
    const userId = known?.id ?? (await createUser({ email, name: name!, password: await password(), admin })).id;
    console.log(known ? `${known.name} is there already; nothing of the account was changed.` : `${name} may now sign in${admin ? ' as administrator' : ''}.`);
    if (project && role?.success) {
      await addMembership({ userId, projectId: project.id, role: role.data });
      console.log(`Member of "${project.name}" as ${role.data}.`);
    }
    return 0;
  } catch (error) {
    if (!(error instanceof UserRefusedError)) throw error;
    console.error(error.message);
    return 1;
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  process.exitCode = await main().finally(closeDatabase);
}
