import { M2_PER_CM2 } from './basal-area';
import { dominantHeight } from './dominant-height';
import type { DominantHeightRefusal } from './dominant-height';
import { quantity, refuse } from './refusal';
import type { Quantity, Refused } from './refusal';
import { relativeDensity, standDensityIndex, summedDensityIndex } from './stand-density';

export type TalliedStem = {
  readonly dbhCm: number;
  /** Null: not measured. */
  readonly heightM: number | null;
  /** Stems per ha that this one stands for; counted twice at a boundary means twice the factor. */
  readonly expansionPerHa: number;
};
export type StandTable = {
  readonly kind: 'stand-table';
  /** Stems tallied. */
  readonly n: number;
  readonly stemsPerHa: number;
  readonly basalAreaPerHa: number;
  /** Quadratic mean diameter, cm: that of the stem of mean basal area. */
  readonly quadraticMeanCm: Quantity<'no-stems'>;
  readonly meanDbhCm: Quantity<'no-stems'>;
  readonly meanHeightM: Quantity<'no-stems' | 'height-missing'>;
  /** Mean height weighted by basal area (Lorey), m. */
  readonly loreyHeightM: Quantity<'no-stems' | 'height-missing'>;
  readonly dominantHeightM: Quantity<DominantHeightRefusal>;
  readonly densityIndex: Quantity<'no-stems' | 'not-positive'>;
  readonly summedDensityIndex: Quantity<'no-stems' | 'not-positive'>;
  readonly relativeDensity: Quantity<'no-stems' | 'not-positive'>;
};

/**
 * What one plot says per hectare: stems, basal area, mean diameters and heights, density.
 *
 * A plot without stems is a true zero: 0 stems and 0 m², with no mean of anything. Means of height need every stem's
 * height; fill missing ones from the height curve beforehand, so that their error is carried along.
 *
 * @param stems the tally with cm, m and stems per ha
 * @returns the table; `bad-stem` when a number is no measurement
 * @source quadratic mean: Curtis and Marshall 2000, Western Journal of Applied Forestry 15(3):137-139 (from memory);
 *   basal-area-weighted height: Lorey 1878 (from memory); others at their functions
 * @example standTable(stems)
 */
export function standTable(stems: readonly TalliedStem[]): StandTable | Refused<'bad-stem'> {
  const positive = (v: number) => Number.isFinite(v) && v > 0;
  if (!stems.every((s) => positive(s.dbhCm) && positive(s.expansionPerHa) && (s.heightM === null || positive(s.heightM)))) return refuse('bad-stem');
  const total = (of: (stem: TalliedStem) => number) => stems.reduce((sum, stem) => sum + stem.expansionPerHa * of(stem), 0);
  const stemsPerHa = total(() => 1);
  const squares = total((s) => s.dbhCm ** 2);
  const basalAreaPerHa = M2_PER_CM2 * squares;
  const perStem = (sum: number): Quantity<'no-stems'> => (stems.length === 0 ? refuse('no-stems') : quantity(sum / stemsPerHa));
  const heightMean = (weight: (stem: TalliedStem) => number): Quantity<'no-stems' | 'height-missing'> => {
    if (stems.length === 0) return refuse('no-stems');
    if (stems.some((s) => s.heightM === null)) return refuse('height-missing');
    return quantity(total((s) => weight(s) * (s.heightM ?? 0)) / total(weight));
  };
  const empty = refuse('no-stems');
  const quadraticMeanCm: Quantity<'no-stems'> = stems.length === 0 ? empty : quantity(Math.sqrt(squares / stemsPerHa));
  const withMean = <R extends string>(of: (meanCm: number) => Quantity<R>) => (quadraticMeanCm.kind === 'refused' ? empty : of(quadraticMeanCm.value));
  return {
    kind: 'stand-table', n: stems.length, stemsPerHa, basalAreaPerHa, quadraticMeanCm,
    meanDbhCm: perStem(total((s) => s.dbhCm)),
    meanHeightM: heightMean(() => 1),
    loreyHeightM: heightMean((s) => s.dbhCm ** 2),
    dominantHeightM: dominantHeight(stems),
    densityIndex: withMean((mean) => standDensityIndex(stemsPerHa, mean, 'metric')),
    summedDensityIndex: stems.length === 0 ? empty : summedDensityIndex(stems),
    relativeDensity: withMean((mean) => relativeDensity(basalAreaPerHa, mean)),
  };
}
