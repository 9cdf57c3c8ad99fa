import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';

type DensityRefusal = 'not-positive';
const exponent = 1.605;
/** DBH of the index's standard stand, 10 in. */
const STANDARD_CM = 25.4;

/**
 * Reineke's stand density index: the stems per area that a stand of 25.4 cm (10 in) mean diameter of equal density has.
 *
 * @param stems per ha (metric) or acre (us), above 0
 * @param meanDiameter quadratic mean, cm (metric) or inches (us), above 0
 * @returns stems per the same area
 * @source Reineke 1933, Journal of Agricultural Research 46:627-638
 * @example standDensityIndex(800, 22, 'metric') // 635.2143
 */
export function standDensityIndex(stems: number, meanDiameter: number, system: 'metric' | 'us'): Quantity<DensityRefusal> {
  if (!(Number.isFinite(stems) && stems > 0 && Number.isFinite(meanDiameter) && meanDiameter > 0)) return refuse('not-positive');
  return quantity(stems * (meanDiameter / (system === 'metric' ? STANDARD_CM : 10)) ** exponent);
}

/**
 * The index summed over stems, which suits uneven stands better; it equals Reineke's in a stand of one diameter.
 *
 * @param stems each with its DBH in cm and the stems per ha it stands for, at least one
 * @source Zeide 1983; Curtis
 * @example summedDensityIndex([{ dbhCm: 25.4, expansionPerHa: 25 }]) // 25
 */
export function summedDensityIndex(stems: readonly { readonly dbhCm: number; readonly expansionPerHa: number }[]): Quantity<DensityRefusal> {
  if (stems.length === 0 || !stems.every((s) => s.dbhCm > 0 && Number.isFinite(s.dbhCm) && s.expansionPerHa > 0 && Number.isFinite(s.expansionPerHa))) return refuse('not-positive');
  return quantity(stems.reduce((sum, s) => sum + s.expansionPerHa * (s.dbhCm / STANDARD_CM) ** exponent, 0));
}

/** Relative density, G over the root of the quadratic mean diameter (m²/ha, cm). Curtis 1982. @example relativeDensity(14.994449, 25.226656) // 2.985387 */
export function relativeDensity(basalAreaPerHa: number, meanDiameterCm: number): Quantity<DensityRefusal> {
  if (!(Number.isFinite(basalAreaPerHa) && basalAreaPerHa > 0 && Number.isFinite(meanDiameterCm) && meanDiameterCm > 0)) return refuse('not-positive');
  return quantity(basalAreaPerHa / Math.sqrt(meanDiameterCm));
}
