import { M2_PER_CM2 } from './basal-area';
import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

/**
 * Stem volume by a form factor: that share of the cylinder over basal area and height.
 *
 * @param dbhCm cm, above 0
 * @param heightM m, above 0
 * @param formFactor of the species, for breast height; between 0 and 1
 * @returns m³
 * @source Husch, Beers and Kershaw 2003, Forest Mensuration (from memory)
 * @example formFactorVolume(30, 22, 0.45) // 0.69978976 m³
 */
export function formFactorVolume(dbhCm: number, heightM: number, formFactor: number): Quantity<'bad-input'> {
  const positive = (v: number) => Number.isFinite(v) && v > 0;
  if (!positive(dbhCm) || !positive(heightM) || !positive(formFactor) || formFactor > 1) return refuse('bad-input');
  return quantity(formFactor * M2_PER_CM2 * dbhCm ** 2 * heightM);
}
