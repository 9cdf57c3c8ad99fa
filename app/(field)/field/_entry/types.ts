import type { Doubt, StemEntry } from '@/lib/checks/types';
import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import type { AcceptReason, Quantity, Reading, SecondLook, Stem, StemMeasurement, Tree } from '@/lib/schema/field';
import type { RecordChange } from '@/lib/schema/record-change';

/**
 * What is being typed and is no reading yet.
 * first: nothing stands in the field; again: an answer to "Read again"; edit: what stands is typed over.
 */
export type Typing = {
  readonly quantity: Quantity;
  readonly digits: string;
  readonly purpose: 'first' | 'again' | 'edit';
  /** The doubt that this typing answers. */
  readonly lookId: string | null;
};

/** What the lower half of the entry shows. At most one question at a time. */
export type Panel =
  | { readonly kind: 'pad' }
  | { readonly kind: 'doubt'; readonly lookId: string }
  /** The second reading differs from the first: taken again at the tree, or misheard? */
  | { readonly kind: 'origin' }
  | { readonly kind: 'reason'; readonly lookId: string }
  | { readonly kind: 'form' }
  | { readonly kind: 'tag' };

/** One stem on the entry card: working copies of its records and what is being typed. */
export type EntryState = {
  readonly tree: Tree;
  readonly stem: Stem;
  readonly measurement: StemMeasurement;
  /** What the store already holds; the rest is made with the first value that stands. */
  readonly saved: { readonly tree: boolean; readonly stem: boolean; readonly measurement: boolean };
  readonly readings: readonly Reading[];
  readonly looks: readonly SecondLook[];
  readonly focus: Quantity;
  readonly typing: Typing | null;
  /** The value here came to stand by a pause: the next key goes on with it instead of starting anew. */
  readonly goesOn: Quantity | null;
  /** Species, status or form was chosen before any value: enough to make a tree of it when the crew goes on. */
  readonly touched: boolean;
  readonly panel: Panel;
  /** Digits that cannot be read as a number were left standing in this field. */
  readonly unreadable: Quantity | null;
};

export type EntryEvent =
  | { readonly kind: 'type'; readonly quantity: Quantity; readonly digits: string }
  | { readonly kind: 'key'; readonly key: string }
  | { readonly kind: 'erase' }
  | { readonly kind: 'pause' }
  | { readonly kind: 'leave'; readonly quantity: Quantity }
  | { readonly kind: 'next' }
  | { readonly kind: 'focus'; readonly quantity: Quantity }
  | { readonly kind: 'species'; readonly speciesId: string }
  | { readonly kind: 'form'; readonly status: StemMeasurement['status']; readonly form: StemMeasurement['form'] }
  | { readonly kind: 'read-again'; readonly lookId: string; readonly quantity: Quantity }
  | { readonly kind: 'origin'; readonly origin: 'again' | 'retyped' }
  | { readonly kind: 'take-suggestion'; readonly lookId: string }
  | { readonly kind: 'accept'; readonly lookId: string; readonly reason: AcceptReason; readonly note: string }
  | { readonly kind: 'show'; readonly panel: Panel }
  /** The stem is left for another: what is typed stands, an unanswered origin counts as the lesser claim. */
  | { readonly kind: 'close' };

/** What the entry needs of the world; ids and time are handed in, so that the same events give the same records. */
export type EntryPorts = {
  newId(): string;
  now(): string;
  /** Who acts, who calls, who writes: user ids. */
  readonly authorId: string;
  readonly measurerId: string | null;
  readonly recorderId: string | null;
  readonly dbhUnit: DbhUnit;
  readonly lengthUnit: LengthUnit;
  /** Digits with comma or point as a number; null when they are none. */
  parse(digits: string): number | null;
  /** A number in the project's unit as cm (DBH) or m (height). */
  canonical(quantity: Quantity, value: number): number;
  curveGroup(speciesId: string | null): string | null;
  check(stem: StemEntry): readonly Doubt[];
};

export type EntryStep = {
  readonly state: EntryState;
  /** To be saved in one transaction, in this order; none when only the screen changed. */
  readonly changes: readonly RecordChange[];
  /** The crew goes on to the next tree. */
  readonly done: boolean;
};
