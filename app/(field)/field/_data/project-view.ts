import type { FieldStore } from '@/lib/client/field-store-types';
import type { RecordChange } from '@/lib/schema/record-change';
import { loadProject } from './load-project';
import { applyChanges } from './project-records';
import type { ProjectRecords } from './project-records';

export type ProjectSnapshot =
  | { readonly kind: 'loading' }
  /** The device holds no pack of it. */
  | { readonly kind: 'missing' }
  | { readonly kind: 'ready'; readonly records: ProjectRecords };

type Draft = Parameters<FieldStore['commit']>[2];

/** A project's records in memory: read once, kept in step with what is saved here and with what a sync brings. */
export class ProjectView {
  #snapshot: ProjectSnapshot = { kind: 'loading' };
  readonly #listeners = new Set<() => void>();
  readonly #loadListeners = new Set<() => void>();
  /** Saves of our own under way or just told of: their notices need no reading anew. */
  #own = 0;
  #saves = 0;
  #turn: Promise<unknown> = Promise.resolve();
  #reloading: ReturnType<typeof setTimeout> | null = null;
  #stop: (() => void) | null = null;

  constructor(readonly store: FieldStore, readonly projectId: string) {}

  readonly snapshot = (): ProjectSnapshot => this.#snapshot;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    this.#stop ??= this.store.subscribe((projectId) => this.#changed(projectId));
    if (this.#snapshot.kind === 'loading') void this.reload();
    return () => {
      this.#listeners.delete(listener);
    };
  };

  /** Called when all records were read anew, not when one's own change was added to them. */
  onLoaded(listener: () => void): () => void {
    this.#loadListeners.add(listener);
    return () => this.#loadListeners.delete(listener);
  }

  async reload(): Promise<void> {
    let records: ProjectRecords | null;
    let seen: number;
    // What is saved while all is read may be missing from what was read.
    do {
      seen = this.#saves;
      records = await loadProject(this.store, this.projectId);
    } while (seen !== this.#saves);
    this.#set(records ? { kind: 'ready', records } : { kind: 'missing' });
    for (const listener of this.#loadListeners) listener();
  }

  /**
   * Saves changes in one transaction and shows them only then. Saves follow each other in the order of the calls.
   * Errors: those of the store; nothing is shown then.
   */
  commit(changes: readonly RecordChange[], authorId: string, options: { readonly draft?: Draft; readonly reason?: string } = {}): Promise<void> {
    const { draft, reason } = options;
    const run = async () => {
      this.#own += 1;
      try {
        await this.store.commit(changes, { projectId: this.projectId, authorId, ...(reason ? { reason } : {}) }, draft);
      } finally {
        // The store tells its listeners in the same turn as it answers; a later notice is somebody else's.
        setTimeout(() => { this.#own -= 1; }, 0);
      }
      this.#saves += 1;
      if (this.#snapshot.kind === 'ready') this.#set({ kind: 'ready', records: applyChanges(this.#snapshot.records, changes) });
    };
    const turn = this.#turn.then(run, run);
    this.#turn = turn.catch(() => undefined);
    return turn;
  }

  close(): void {
    this.#stop?.();
    if (this.#reloading) clearTimeout(this.#reloading);
  }

  #changed(projectId: string | null): void {
    // Null: only the queue changed.
    if (projectId !== this.projectId) return;
    if (this.#own > 0) return;
    // A sync brings page after page; reading all records once after them is enough.
    if (this.#reloading) clearTimeout(this.#reloading);
    this.#reloading = setTimeout(() => void this.reload(), 250);
  }

  #set(snapshot: ProjectSnapshot): void {
    this.#snapshot = snapshot;
    for (const listener of this.#listeners) listener();
  }
}
