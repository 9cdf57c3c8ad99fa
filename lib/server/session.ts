import 'server-only';
import { v7 } from 'uuid';
import { openDatabase } from '@/models';
import type { SignedIn } from './policies';
import { write } from './write-queue';

/** What a session token claims; nothing of it is believed before the sessions table has been asked. */
export type SessionClaims = { readonly userId: string; readonly sessionId: string; readonly tokenVersion: number };

/** Long enough to come back from fourteen days without signal and still send. */
export const SESSION_DAYS = 30;
const SEEN_EVERY_MS = 5 * 60_000;

/** Records a sign-in. The person must exist. */
export function startSession(userId: string): Promise<SessionClaims> {
  return write(async ({ models, transaction }) => {
    const user = await models.User.findByPk(userId, { transaction, rejectOnEmpty: true });
    const now = new Date().toISOString();
    const row = { id: v7(), userId, tokenVersion: user.tokenVersion, createdAt: now, lastSeenAt: now, revokedAt: null };
    await models.Session.create(row, { transaction });
    return { userId, sessionId: row.id, tokenVersion: row.tokenVersion };
  });
}

/** Ends one session, as signing out does. */
export function revokeSession(sessionId: string): Promise<void> {
  return write(async ({ models, transaction }) => {
    await models.Session.update({ revokedAt: new Date().toISOString() }, { where: { id: sessionId, revokedAt: null }, transaction });
  });
}

/** Ends every session of a person: on disabling, on a new password, on suspicion. */
export function revokeAllSessions(userId: string): Promise<void> {
  return write(async ({ models, transaction }) => {
    await models.User.increment('tokenVersion', { by: 1, where: { id: userId }, transaction });
    await models.Session.update({ revokedAt: new Date().toISOString() }, { where: { userId, revokedAt: null }, transaction });
  });
}

function noteSeen(sessionId: string, lastSeenAt: string, now: Date): void {
  if (now.getTime() - Date.parse(lastSeenAt) < SEEN_EVERY_MS) return;
  write(async ({ models, transaction }) => {
    await models.Session.update({ lastSeenAt: now.toISOString() }, { where: { id: sessionId }, transaction });
  }).catch((error: unknown) => console.error('[session] last-seen time not stored', error));
}

/** The person of a session as of now, or null: unknown, revoked, too old, disabled, or of an earlier token version. */
export async function personOfSession({ userId, sessionId, tokenVersion }: SessionClaims, now = new Date()): Promise<SignedIn | null> {
  const { models } = await openDatabase();
  const session = await models.Session.findByPk(sessionId);
  if (!session || session.userId !== userId || session.revokedAt !== null || session.tokenVersion !== tokenVersion) return null;
  if (now.getTime() - Date.parse(session.createdAt) > SESSION_DAYS * 86_400_000) return null;
  const user = await models.User.findByPk(userId);
  if (!user || user.disabled || user.tokenVersion !== tokenVersion) return null;
  const memberships = await models.Membership.findAll({ where: { userId } });
  noteSeen(sessionId, session.lastSeenAt, now);
  return {
    id: user.id, name: user.name, email: user.email, admin: user.admin, sessionId,
    roles: new Map(memberships.map(({ projectId, role }) => [projectId, role])),
  };
}
