import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import type { Cause, Moment, Quantity } from '@/lib/schema/field';

/** The units and decimals that a project has locked. */
export type ProjectUnits = {
  readonly dbhUnit: DbhUnit;
  readonly lengthUnit: LengthUnit;
  readonly dbhDecimals: number;
  readonly heightDecimals: number;
  readonly breastHeightM: number;
};

/** One stem as it stands: canonical values (cm, m), null where nothing has been entered. */
export type StemEntry = {
  readonly id: string;
  readonly plotId: string;
  readonly speciesId: string | null;
  readonly curveGroup: string | null;
  readonly status: 'live' | 'dead';
  readonly form: 'whole' | 'broken' | 'forked' | 'leaning';
  readonly dbhDigits: string | null;
  readonly dbhCm: number | null;
  readonly heightDigits: string | null;
  readonly heightM: number | null;
  readonly heightMethod: 'measured' | 'estimated' | null;
};

/** What the band says of one height; canonical units. */
export type BandReading =
  | { readonly kind: 'band'; readonly lowM: number; readonly highM: number; readonly medianM: number; readonly level: number; readonly source: 'curve' | 'pooled' | 'weak'; readonly widened: boolean }
  | { readonly kind: 'none'; readonly reason: 'outside-diameters' | 'no-height-expected' | 'no-diameter' };

/** One doubt, before it becomes a record. Expected limits and the suggestion are canonical (cm or m) beside their digits. */
export type Doubt = {
  readonly rule: string;
  readonly moment: Moment;
  readonly level: 'look' | 'quiet';
  readonly quantity: Quantity;
  readonly enteredDigits: string | null;
  readonly enteredCanonical: number | null;
  readonly expectedLow: number | null;
  readonly expectedHigh: number | null;
  readonly tailProbability: number | null;
  readonly cause: Cause | null;
  readonly causeProbability: number | null;
  readonly suggestion: { readonly quantity: Quantity; readonly digits: string; readonly canonical: number } | null;
};

/** What is known of how a stem's doubts were answered; decides how much the stem teaches. */
export type Teaching = 'undoubted' | 'open' | 'measured-twice' | 'accepted' | 'none';

/** Everything that the checks need to know of a project and its trees so far. Made by `createScreen`. */
export interface Screen {
  readonly units: ProjectUnits;
  /** O(1): the stem begins to teach (or teaches differently, when it was known). */
  teach(stem: StemEntry, teaching: Teaching): void;
  /** O(1): the stem no longer teaches. */
  forget(stemId: string): void;
  /** All doubts about a stem as it stands, the most telling first; never uses the stem's own teaching. */
  screen(stem: StemEntry): readonly Doubt[];
  /** The expected band for the stem's height at `level` (for instance 0.99), its own teaching left out. */
  band(stem: StemEntry, level: number): BandReading;
}
