import type { ProjectRecords } from '../_data/project-records';
import { restoreEntry } from './entry-draft';
import type { EntryDraft } from './entry-draft';
import { storedEntry } from './next-entry';
import type { EntryState } from './types';

/** The card as it was left, laid over what was saved; null when the stem has been deleted since. */
export function restoreDraft(draft: EntryDraft, records: ProjectRecords): EntryState | null {
  const stored = storedEntry(records, draft.measurement.id);
  if (stored) {
    if (stored.measurement.deleted) return null;
    const restored = restoreEntry(draft, stored);
    const panel = restored.panel.kind === 'origin' || restored.typing ? restored.panel : stored.panel;
    return { ...restored, panel };
  }
  const tree = records.tree.get(draft.tree.id);
  const stem = records.stem.get(draft.stem.id);
  if (tree?.deleted) return null;
  return restoreEntry(draft, {
    saved: { tree: tree !== undefined, stem: stem !== undefined, measurement: false }, readings: [], looks: [], ...(tree ? { tree } : {}), ...(stem ? { stem } : {}),
  });
}
