import type { Draft, FieldStore } from '@/lib/client/field-store-types';
import type { Json } from '@/lib/schema/common';
import { draftOf, entryDraftId } from './entry-draft';
import type { EntryState } from './types';

const EVERY_MS = 250;

/**
 * Keeps what is typed and not saved: at the first key at once, then every 250 ms while typing goes on, and whenever
 * `flush` is called. A kill costs at most the keys of the last quarter second.
 */
export class DraftKeeper {
  #state: EntryState | null = null;
  #kept: string | null = null;
  #timer: ReturnType<typeof setTimeout> | null = null;

  constructor(readonly store: Pick<FieldStore, 'draft' | 'saveDraft'>, readonly visit: { readonly id: string; readonly projectId: string }) {}

  /** The stored draft of the visit, unparsed. */
  async read(): Promise<Json | null> {
    return (await this.store.draft(entryDraftId(this.visit.id)))?.body ?? null;
  }

  /** The card as it stands now, to be kept with the next commit. */
  note(state: EntryState): void {
    this.#state = state;
  }

  /** The card as it stands now, to be kept soon. */
  offer(state: EntryState): void {
    this.note(state);
    if (this.#timer !== null) return;
    this.flush();
    this.#timer = setTimeout(() => {
      this.#timer = null;
      this.flush();
    }, EVERY_MS);
  }

  /** The draft as it stands, to be saved with a commit. */
  readonly take = (): { put: Draft } | undefined => {
    if (!this.#state) return undefined;
    const text = JSON.stringify(draftOf(this.#state));
    this.#kept = text;
    return { put: { id: entryDraftId(this.visit.id), projectId: this.visit.projectId, updatedAt: new Date().toISOString(), body: JSON.parse(text) as Json } };
  };

  readonly flush = (): void => {
    if (!this.#state || JSON.stringify(draftOf(this.#state)) === this.#kept) return;
    const draft = this.take();
    // A draft that was not kept is tried again with the next key; values themselves go through commit.
    if (draft) this.store.saveDraft(draft.put).catch((error: unknown) => console.warn('The draft was not kept:', error));
  };

  stop(): void {
    if (this.#timer !== null) clearTimeout(this.#timer);
    this.#timer = null;
    this.flush();
  }
}
