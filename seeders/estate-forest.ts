import { estateGroups } from './estate-groups';
import { estatePlotNumbers, estateSpecies, estateStrata } from './estate-places';
import { seededRandom } from './seeded-random';
import type { SeededRandom } from './seeded-random';

export type StemTruth = {
  readonly label: string;
  /** Now, at the time of the coming visit. `form` broken: `heightM` is where it broke. */
  readonly dbhCm: number;
  readonly heightM: number;
  /** At the earlier visit, before the measuring errors of the tape; null where the stem was not yet thick enough. */
  readonly before: { readonly dbhCm: number; readonly heightM: number } | null;
  /** e: how far ln(h − bh) lies off the plot's curve. */
  readonly residual: number;
};

export type TreeTruth = {
  readonly tag: string;
  readonly speciesCode: string;
  readonly curveGroup: string;
  readonly status: 'live' | 'dead';
  readonly form: 'whole' | 'broken' | 'forked' | 'leaning';
  readonly stems: readonly StemTruth[];
};

export type PlotTruth = {
  readonly number: string;
  /** Index into the strata. */
  readonly stratum: number;
  /** u: shifts ln(h − bh) of every stem of the plot. */
  readonly effect: number;
  /** Years since the earlier visit, or null where there was none. */
  readonly yearsSince: number | null;
  /** In order of tag, which is the order round the plot from north. Empty on a plot without trees. */
  readonly trees: readonly TreeTruth[];
};

type ForestSettings = { readonly sigma: number; readonly tauSquared: number; readonly dbhThresholdCm: number; readonly plotAreaHa: number };

/** The wind took this one years ago; it is measured and has no trees, which is a result. */
const EMPTY_PLOT = '209';
const BREAST_HEIGHT_M = 1.3;

function pickSpecies(random: SeededRandom, mix: Readonly<Record<string, number>>): string {
  let left = random.uniform();
  const codes = Object.entries(mix);
  for (const [code, share] of codes) {
    left -= share;
    if (left < 0) return code;
  }
  return codes.at(-1)![0];
}

function pickForm(random: SeededRandom, curveGroup: string): Pick<TreeTruth, 'status' | 'form'> & { stems: number } {
  const draw = random.uniform();
  if (draw < 0.03) return { status: 'dead', form: 'whole', stems: 1 };
  if (draw < 0.05) return { status: 'live', form: 'broken', stems: 1 };
  if (draw < 0.06) return { status: 'live', form: 'leaning', stems: 1 };
  if (draw < 0.07) return { status: 'live', form: 'forked', stems: 1 };
  return { status: 'live', form: 'whole', stems: curveGroup === 'beech' && draw > 0.97 ? 2 : 1 };
}

type Untagged = Omit<TreeTruth, 'tag'>;

function growTree(
  random: SeededRandom, mix: Readonly<Record<string, number>>, plot: Pick<PlotTruth, 'effect' | 'yearsSince'>, settings: ForestSettings,
): Untagged {
  const speciesCode = pickSpecies(random, mix);
  const curveGroup = estateSpecies.find(({ code }) => code === speciesCode)!.curveGroup;
  const group = estateGroups.find((candidate) => candidate.curveGroup === curveGroup)!;
  const { status, form, stems } = pickForm(random, curveGroup);
  const makeStem = (label: string): StemTruth => {
    let dbhCm = 0;
    while (dbhCm < settings.dbhThresholdCm) dbhCm = Math.exp(group.logDMean + group.logDSd * random.normal());
    const residual = settings.sigma * random.normal();
    const brokenAt = 0.4 + 0.45 * random.uniform();
    const heightAt = (d: number) => {
      const whole = BREAST_HEIGHT_M + (group.medianHeightM(d) - BREAST_HEIGHT_M) * Math.exp(plot.effect + residual);
      return form === 'broken' ? Math.max(2, whole * brokenAt) : whole;
    };
    const perYear = status === 'dead' ? 0 : group.growthCmPerYear * Math.exp(0.35 * random.normal());
    const beforeCm = plot.yearsSince === null ? null : dbhCm - plot.yearsSince * perYear;
    const stoodBefore = beforeCm !== null && beforeCm >= settings.dbhThresholdCm;
    return { label, dbhCm, heightM: heightAt(dbhCm), residual, before: stoodBefore ? { dbhCm: beforeCm, heightM: heightAt(beforeCm) } : null };
  };
  return { speciesCode, curveGroup, status, form, stems: stems === 1 ? [makeStem('a')] : [makeStem('a'), makeStem('b')] };
}

/** Every stem of the 60 plots. Each plot draws from a stream of its own. */
export function estateForest(seed: string, settings: ForestSettings): readonly PlotTruth[] {
  return estatePlotNumbers().map(({ number, stratum }, index): PlotTruth => {
    const random = seededRandom(`${seed}/plot/${number}`);
    const effect = Math.sqrt(settings.tauSquared) * settings.sigma * random.normal();
    // Every other plot was measured before: a panel of 15 three seasons ago, one of 15 two seasons ago.
    const yearsSince = index % 2 === 0 ? (index % 4 === 0 ? 3 : 2) : null;
    const { stemsPerHa, mix } = estateStrata[stratum]!;
    const count = number === EMPTY_PLOT ? 0 : Math.max(6, random.poisson(stemsPerHa * settings.plotAreaHa));
    const grown = Array.from({ length: count }, () => growTree(random, mix, { effect, yearsSince }, settings));
    // Tags were given at the earlier visit, round the plot from north; trees that have grown in since have the next ones.
    const stoodBefore = (tree: Untagged) => tree.stems.some(({ before }) => before !== null);
    const trees = [...grown.filter(stoodBefore), ...grown.filter((tree) => !stoodBefore(tree))].map((tree, i) => ({ tag: String(i + 1), ...tree }));
    return { number, stratum, effect, yearsSince, trees };
  });
}
