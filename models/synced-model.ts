import type { Model, ModelStatic } from 'sequelize';
import type { EntityName, EntityRecord } from '@/lib/schema/entities';

/** A record as the server stores it: the record's fields and the cursor of its last applied change. */
export type SyncedRow<E extends EntityName> = EntityRecord[E] & { revision: number };

/** An instance of a synced table; its fields are also its properties. */
export type SyncedInstance<E extends EntityName> = Model<SyncedRow<E>, SyncedRow<E>> & SyncedRow<E>;

export type SyncedModel<E extends EntityName> = ModelStatic<SyncedInstance<E>>;
