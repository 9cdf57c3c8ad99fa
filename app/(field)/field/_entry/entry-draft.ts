import { z } from 'zod';
import type { Json } from '@/lib/schema/common';
import { idSchema } from '@/lib/schema/common';
import { quantitySchema, stemMeasurementSchema, stemSchema, treeSchema } from '@/lib/schema/field';
import type { EntryState } from './types';

const draftSchema = z.object({
  v: z.literal(1),
  tree: treeSchema,
  stem: stemSchema,
  measurement: stemMeasurementSchema,
  focus: quantitySchema,
  touched: z.boolean(),
  typing: z.object({ quantity: quantitySchema, digits: z.string().max(12), purpose: z.enum(['first', 'again', 'edit']), lookId: idSchema.nullable() }).nullable(),
  panel: z.enum(['pad', 'origin']),
});
export type EntryDraft = z.infer<typeof draftSchema>;

/** The draft of a visit is one: the stem on its entry card. */
export const entryDraftId = (visitId: string) => `visit:${visitId}`;

/** What must survive a kill beside the saved records: the stem on the card and the digits under way. */
export function draftOf({ tree, stem, measurement, focus, touched, typing, panel }: EntryState): EntryDraft {
  return { v: 1, tree, stem, measurement, focus, touched, typing, panel: panel.kind === 'origin' && typing ? 'origin' : 'pad' };
}

/** A stored draft; null when it is of another version or torn. */
export function parseDraft(body: Json | null): EntryDraft | null {
  const parsed = draftSchema.safeParse(body);
  return parsed.success ? parsed.data : null;
}

/** The entry as it was left, over the records that the store holds now. */
export function restoreEntry(draft: EntryDraft, stored: Pick<EntryState, 'saved' | 'readings' | 'looks'> & Partial<Pick<EntryState, 'tree' | 'stem' | 'measurement'>>): EntryState {
  return {
    tree: stored.tree ?? draft.tree,
    stem: stored.stem ?? draft.stem,
    measurement: stored.measurement ?? draft.measurement,
    saved: stored.saved, readings: stored.readings, looks: stored.looks,
    focus: draft.focus, typing: draft.typing, goesOn: null, touched: draft.touched, panel: { kind: draft.panel }, unreadable: null,
  };
}
