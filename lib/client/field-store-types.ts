import type { Json, Role } from '@/lib/schema/common';
import type { EntityName, EntityRecord } from '@/lib/schema/entities';
import type { ChangeContext, RecordChange } from '@/lib/schema/record-change';
import type { WorkPack } from '@/lib/schema/wire';

/** Who signed in on this device; kept in the device's own store so that the field never asks a session. */
export type Identity = {
  readonly userId: string;
  readonly name: string;
  readonly email: string;
  readonly signedInAt: string;
  readonly projects: readonly { readonly id: string; readonly name: string; readonly role: Role | 'admin' }[];
};

/** What is being typed and has not been saved as a value; survives a kill. */
export type Draft = { readonly id: string; readonly projectId: string; readonly updatedAt: string; readonly body: Json };

export type PackSummary = {
  readonly projectId: string;
  readonly name: string;
  readonly fetchedAt: string;
  readonly cursor: number;
  readonly people: WorkPack['people'];
};

export type QueueState = {
  /** Operations not yet acknowledged by a server. */
  readonly unsent: number;
  readonly lastSyncAt: string | null;
  readonly quarantined: readonly { readonly opId: string; readonly reason: string; readonly entity: string; readonly recordId: string }[];
};

/**
 * The device's store. Every promise that reports a save resolves only after the strictly durable transaction
 * has committed; "Saved" may be shown then and not before. Errors reject; nothing is swallowed.
 */
export interface FieldStore {
  readonly deviceId: string;
  /** Saves changes, their operations, the chain's head and (optionally) a draft in one transaction. */
  commit(changes: readonly RecordChange[], context: ChangeContext, draft?: { put?: Draft; remove?: string }): Promise<{ readonly firstSeq: number; readonly lastSeq: number }>;
  list<E extends EntityName>(projectId: string, entity: E): Promise<EntityRecord[E][]>;
  get<E extends EntityName>(entity: E, id: string): Promise<EntityRecord[E] | null>;
  /** Called after each commit or received page, with the project touched. Returns the way to stop. */
  subscribe(listener: (projectId: string | null) => void): () => void;
  identities(): Promise<readonly Identity[]>;
  currentIdentity(): Promise<Identity | null>;
  setIdentity(identity: Identity | null): Promise<void>;
  savePack(pack: WorkPack): Promise<void>;
  packs(): Promise<readonly PackSummary[]>;
  saveDraft(draft: Draft): Promise<void>;
  draft(id: string): Promise<Draft | null>;
  removeDraft(id: string): Promise<void>;
  queue(projectId?: string): Promise<QueueState>;
  /** Small settings of this device (theme, glove mode, last place). */
  setting(key: string): Promise<Json | null>;
  setSetting(key: string, value: Json): Promise<void>;
}
