import type { Draft, FieldStore } from '@/lib/client/field-store-types';
import type { Json } from '@/lib/schema/common';
import { draftOf, entryDraftId } from './entry-draft';
import type { EntryState } from './types';

/**
 * Keeps what is typed and not saved: each state as soon as the one before is on disk, so that a kill costs at most the
 * keys of one write. While a commit carries a draft of its own, others wait: the two would overtake each other, and an
 * older card would stand over a newer one.
 */
export class DraftKeeper {
  #state: EntryState | null = null;
  #kept: string | null = null;
  #writing = false;
  #held = 0;

  constructor(readonly store: Pick<FieldStore, 'draft' | 'saveDraft'>, readonly visit: { readonly id: string; readonly projectId: string }) {}

  /** The stored draft of the visit, unparsed. */
  async read(): Promise<Json | null> {
    return (await this.store.draft(entryDraftId(this.visit.id)))?.body ?? null;
  }

  /** The card as it stands now, to be kept with the next commit. */
  note(state: EntryState): void {
    this.#state = state;
  }

  /** The card as it stands now, to be kept at once. */
  offer(state: EntryState): void {
    this.note(state);
    this.flush();
  }

  /** The draft for a commit about to begin; `release` must follow when it has ended. */
  readonly hold = (): { put: Draft } | undefined => {
    this.#held += 1;
    return this.#take();
  };

  readonly release = (committed: boolean): void => {
    this.#held -= 1;
    if (!committed) this.#kept = null;
    this.flush();
  };

  readonly flush = (): void => {
    if (this.#writing || this.#held > 0 || !this.#state || JSON.stringify(draftOf(this.#state)) === this.#kept) return;
    const draft = this.#take();
    if (!draft) return;
    this.#writing = true;
    this.store.saveDraft(draft.put)
      // A draft that was not kept is tried again with the next key; values themselves go through commit.
      .catch((error: unknown) => console.warn('The draft was not kept:', error))
      .finally(() => {
        this.#writing = false;
        this.flush();
      });
  };

  #take(): { put: Draft } | undefined {
    if (!this.#state) return undefined;
    const text = JSON.stringify(draftOf(this.#state));
    this.#kept = text;
    return { put: { id: entryDraftId(this.visit.id), projectId: this.visit.projectId, updatedAt: new Date().toISOString(), body: JSON.parse(text) as Json } };
  }
}
