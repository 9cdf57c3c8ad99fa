import 'server-only';
import { UniqueConstraintError } from 'sequelize';
import { v7 } from 'uuid';
import { z } from 'zod';
import { nameSchema } from '@/lib/schema/common';
import { hashPassword } from './password';
import { passwordFaults } from './password-policy';
import { write } from './write-queue';

/** The person was not made; `faults` says why, in words. */
export class UserRefusedError extends Error {
  override readonly name = 'UserRefusedError';
  constructor(readonly faults: readonly string[]) {
    super(faults.join(' '));
  }
}

const newUserSchema = z.strictObject({
  email: z.string().trim().toLowerCase().pipe(z.email('The e-mail address is not one.').max(254)),
  name: nameSchema,
  password: z.string(),
  admin: z.boolean().default(false),
});
export type NewUser = z.input<typeof newUserSchema>;
export type CreatedUser = { readonly id: string; readonly email: string; readonly name: string; readonly admin: boolean };

/** Makes a person who can sign in. Errors: UserRefusedError (address, name, password, address taken). */
export async function createUser(input: NewUser): Promise<CreatedUser> {
  const parsed = newUserSchema.safeParse(input);
  if (!parsed.success) throw new UserRefusedError(parsed.error.issues.map(({ message }) => message));
  const { email, name, password, admin } = parsed.data;
  const faults = passwordFaults(password, email);
  if (faults.length > 0) throw new UserRefusedError(faults);
  const passwordHash = await hashPassword(password);
  const row = { id: v7(), email, name, passwordHash, admin, disabled: false, tokenVersion: 0, createdAt: new Date().toISOString() };
  try {
    await write(({ models, transaction }) => models.User.create(row, { transaction }));
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new UserRefusedError([`There is already a person with the address ${email}.`]);
    throw error;
  }
  return { id: row.id, email, name, admin };
}
