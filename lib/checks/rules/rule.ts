import type { Moment } from '@/lib/schema/field';
import type { HeightBand } from '../band/height-band';
import type { WeighedCauses } from '../causes/weigh-causes';
import type { Doubt, ProjectUnits, StemEntry } from '../types';
import type { Predictive } from '@/lib/stats/mixed/plot-intercept';

/** What a rule may know: the stem as it stands and what was learned from all others. */
export type RuleContext = {
  readonly units: ProjectUnits;
  /** Shares of correct trees that may be asked about, per tree: for the height and for the diameter. */
  readonly heightRate: number;
  readonly diameterRate: number;
  /** Null where no height is expected (broken, dead, leaning, forked) or no group is known. */
  readonly band: HeightBand | null;
  readonly logDiameter: Predictive;
  readonly causes: WeighedCauses | null;
};

/** One check: pure, with an id, its moment, why it asks, and where that comes from. */
export type Rule = {
  readonly id: string;
  readonly moment: Moment;
  readonly reason: string;
  readonly source: string;
  readonly check: (stem: StemEntry, context: RuleContext) => Doubt | null;
};
