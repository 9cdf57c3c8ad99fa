import { addMembership } from '@/lib/server/add-membership';
import { createUser } from '@/lib/server/create-user';
import { recordChanges } from '@/lib/server/log/record-changes';
import { write } from '@/lib/server/write-queue';
import { demoPeople } from '@/seeders/demo-people';
import type { DemoPeopleIds, DemoPersonKey } from '@/seeders/demo-people';
import { estateRecords } from '@/seeders/estate-records';

/** The invented estate with its design and its people, without earlier visits: enough to work in the field. Quick to make. */
export async function seedFieldProject(): Promise<{ readonly projectId: string; readonly signIn: (key: DemoPersonKey) => { email: string; password: string; name: string } }> {
  const made = await Promise.all(demoPeople.map(async ({ key, name, email, password, admin }) => [key, (await createUser({ name, email, password, admin })).id] as const));
  const people = Object.fromEntries(made) as DemoPeopleIds;
  const { projectId, design } = estateRecords(people);
  await write((context) => recordChanges(context, design, { projectId, authorId: people.analyst }));
  for (const { key, estateRole } of demoPeople) if (estateRole) await addMembership({ userId: people[key], projectId, role: estateRole });
  return { projectId, signIn: (key) => demoPeople.find((person) => person.key === key)! };
}
