/** A curve group as it truly grows on the estate. */
export type GroupTruth = {
  readonly curveGroup: string;
  /** The curve in words and symbols; d in cm, h in m. */
  readonly formula: string;
  /** Coefficients where the truth is of the Curtis form ln(h − 1.3) = b0 + b1·ln(d/(1 + d)), else null. */
  readonly curtis: { readonly b0: number; readonly b1: number } | null;
  /** Median total height in m of stems of `dbhCm` on a plot without an effect. */
  readonly medianHeightM: (dbhCm: number) => number;
  /** Mean and standard deviation of ln d (cm) of all stems, before those below the tally threshold are left out. */
  readonly logDMean: number;
  readonly logDSd: number;
  /** Mean diameter growth of a stem, cm per year. */
  readonly growthCmPerYear: number;
};

const BREAST_HEIGHT_M = 1.3;

function curtisGroup(b0: number, b1: number): Pick<GroupTruth, 'curtis' | 'formula' | 'medianHeightM'> {
  return {
    curtis: { b0, b1 },
    formula: `ln(h − 1.3) = ${b0} + ${b1}·ln(d/(1 + d))`,
    medianHeightM: (dbhCm) => BREAST_HEIGHT_M + Math.exp(b0 + b1 * Math.log(dbhCm / (1 + dbhCm))),
  };
}

/**
 * Three groups. Spruce with fir and beech follow the Curtis form, pine follows none of the four forms that are fitted
 * (Chapman–Richards), as forests do not either. All numbers are invented; the heights they give (23–24 m at 30 cm) are
 * ordinary for managed central European high forest.
 */
export const estateGroups: readonly GroupTruth[] = [
  { curveGroup: 'spruce-fir', ...curtisGroup(3.46, 10.4), logDMean: Math.log(27), logDSd: 0.36, growthCmPerYear: 0.45 },
  { curveGroup: 'beech', ...curtisGroup(3.38, 8.2), logDMean: Math.log(24), logDSd: 0.42, growthCmPerYear: 0.32 },
  {
    curveGroup: 'pine',
    curtis: null,
    formula: 'h = 1.3 + 23.5·(1 − exp(−0.075·d))^1.15',
    medianHeightM: (dbhCm) => BREAST_HEIGHT_M + 23.5 * (1 - Math.exp(-0.075 * dbhCm)) ** 1.15,
    logDMean: Math.log(29),
    logDSd: 0.26,
    growthCmPerYear: 0.28,
  },
];
