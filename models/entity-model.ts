import type { Model, ModelStatic } from 'sequelize';
import type { EntityName } from '@/lib/schema/entities';
import type { Models } from './define-models';
import type { SyncedModel } from './synced-model';

const modelNames = {
  project: 'Project', stratum: 'Stratum', speciesEntry: 'SpeciesEntry', plot: 'Plot', heightCurve: 'HeightCurve', visit: 'Visit', tree: 'Tree',
  stem: 'Stem', stemMeasurement: 'StemMeasurement', reading: 'Reading', secondLook: 'SecondLook', conflict: 'Conflict',
} as const satisfies Record<EntityName, keyof Models>;

/** A synced row of which only the common fields are known by name. */
export type AnyRow = { id: string; projectId: string; deleted: boolean; revision: number } & Record<string, unknown>;
export type AnySyncedModel = ModelStatic<Model<AnyRow, AnyRow>>;

/** The model of one entity, with its fields. */
export function entityModel<E extends EntityName>(models: Models, entity: E): SyncedModel<E> {
  return models[modelNames[entity]] as unknown as SyncedModel<E>;
}

/** The model of an entity that is known only at run time, for code that treats all entities alike. */
export function anyEntityModel(models: Models, entity: EntityName): AnySyncedModel {
  return models[modelNames[entity]] as unknown as AnySyncedModel;
}
