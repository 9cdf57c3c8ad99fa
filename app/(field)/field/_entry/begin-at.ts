import type { Draft } from '@/lib/client/field-store-types';
import type { Json } from '@/lib/schema/common';
import type { ProjectView } from '../_data/project-view';
import { draftOf, entryDraftId } from './entry-draft';
import { storedEntry } from './next-entry';

/** A draft that puts a measured stem on the card when its visit is opened; null when the stem is not there. */
export function beginAt(view: ProjectView, visit: { readonly id: string; readonly projectId: string }, measurementId: string): Draft | null {
  const snapshot = view.snapshot();
  const entry = snapshot.kind === 'ready' ? storedEntry(snapshot.records, measurementId) : null;
  if (!entry) return null;
  return { id: entryDraftId(visit.id), projectId: visit.projectId, updatedAt: new Date().toISOString(), body: JSON.parse(JSON.stringify(draftOf(entry))) as Json };
}
