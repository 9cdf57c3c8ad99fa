import type { EntityName, EntityRecord } from './entities';

/** One change to one record, to be saved as one operation. `create` takes all fields, group '*'. */
export type RecordChange = {
  readonly [E in EntityName]:
    | { readonly entity: E; readonly recordId: string; readonly kind: 'create'; readonly values: EntityRecord[E] }
    | { readonly entity: E; readonly recordId: string; readonly kind: 'set'; readonly group: string; readonly values: Partial<EntityRecord[E]> }
    | { readonly entity: E; readonly recordId: string; readonly kind: 'delete' | 'restore' };
}[EntityName];

/** Who changes something, in which project and (where they say) why. */
export type ChangeContext = { readonly projectId: string; readonly authorId: string; readonly reason?: string };
