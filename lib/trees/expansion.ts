import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';
import { SQUARE_FEET_PER_ACRE, SQUARE_METRES_PER_HECTARE } from './plot-radius';

/**
 * Trees per unit of land that one tallied tree stands for on a plot of fixed area.
 *
 * Assumes that the whole plot lies in the population and was tallied; for boundary plots see `boundary-overlap`.
 *
 * @param area of the plot: m² gives trees per ha, ft² gives trees per acre; above 0
 * @returns 10,000/area or 43,560/area; `not-positive` otherwise
 * @source definition, the inverse of the plot's area
 * @example areaExpansion(400, 'metric') // 25 trees per ha
 */
export function areaExpansion(area: number, system: 'metric' | 'us'): Quantity<'not-positive'> {
  if (!(Number.isFinite(area) && area > 0)) return refuse('not-positive');
  return quantity((system === 'metric' ? SQUARE_METRES_PER_HECTARE : SQUARE_FEET_PER_ACRE) / area);
}

/**
 * Expansion factor of a tree when its design is laid out several times at one location: subplots of a cluster, or
 * several angle-count points.
 *
 * Assumes equal subplots, all of them visited; part clusters are estimated as a ratio, not by scaling up.
 *
 * @param single factor of one subplot or point, above 0
 * @param count subplots or points at the location, a whole number of at least 1
 * @returns single/count; refused otherwise
 * @source FIA Database User Guide 9.3 (2024), section 1.2.5
 * @example clusterExpansion(24.072185, 4) // 6.018046 trees per acre
 */
export function clusterExpansion(single: number, count: number): Quantity<'not-positive' | 'bad-count'> {
  if (!(Number.isFinite(single) && single > 0)) return refuse('not-positive');
  if (!Number.isInteger(count) || count < 1) return refuse('bad-count');
  return quantity(single / count);
}
