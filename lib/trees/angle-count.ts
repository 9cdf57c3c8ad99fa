import { quantity, refuse } from './refusal';
import type { Quantity } from './refusal';
import { SQUARE_FEET_PER_ACRE, SQUARE_METRES_PER_HECTARE } from './plot-radius';

/** m²/ha with DBH in cm and distances in m, or ft²/ac with DBH in inches and distances in feet. */
export type AngleCountSystem = 'metric' | 'us';
type AngleRefusal = 'bad-factor' | 'bad-dbh';

/** Square metres or feet of land per ha or acre. */
const land = (system: AngleCountSystem): number => (system === 'metric' ? SQUARE_METRES_PER_HECTARE : SQUARE_FEET_PER_ACRE);
/** DBH units per unit of distance: cm per m, inches per ft. */
const perDistance = (system: AngleCountSystem): number => (system === 'metric' ? 100 : 12);
const positive = (value: number): boolean => Number.isFinite(value) && value > 0;

/**
 * Limiting distance of a stem at an angle-count point.
 *
 * The distance check with measured DBH decides over borderline stems and is what makes the factor true, not the prism.
 *
 * @param basalAreaFactor m²/ha or ft²/ac, above 0
 * @param dbh cm or inches, above 0
 * @param to stem centre, or the face half a DBH nearer
 * @returns m or ft, horizontal: d/(2 sqrt(k)) metric, 8.69626 d/sqrt(BAF) us, less half the DBH for the face
 * @source Bitterlich 1948; Grosenbaugh 1952
 * @example limitingDistance(4, 30, 'metric', 'face') // 7.35 m
 */
export function limitingDistance(basalAreaFactor: number, dbh: number, system: AngleCountSystem, to: 'centre' | 'face'): Quantity<AngleRefusal> {
  if (!positive(basalAreaFactor)) return refuse('bad-factor');
  if (!positive(dbh)) return refuse('bad-dbh');
  const halfDbh = dbh / perDistance(system) / 2;
  const toCentre = halfDbh * Math.sqrt(land(system) / basalAreaFactor);
  return quantity(to === 'centre' ? toCentre : toCentre - halfDbh);
}

/**
 * Limiting distance per unit of DBH (the plot radius factor).
 *
 * @returns m per cm, or ft per inch
 * @source Grosenbaugh 1952
 * @example plotRadiusFactor(10, 'us', 'centre') // 2.75 ft per inch
 */
export function plotRadiusFactor(basalAreaFactor: number, system: AngleCountSystem, to: 'centre' | 'face'): Quantity<AngleRefusal> {
  return limitingDistance(basalAreaFactor, 1, system, to);
}

/**
 * Full angle of the gauge.
 *
 * @returns degrees, 2 asin(sqrt(k/10,000)) or 2 asin(sqrt(BAF/43,560)); `bad-factor` where no angle exists
 * @source Bitterlich 1948; Grosenbaugh 1952
 * @example gaugeAngle(4, 'metric') // 2.29198 degrees
 */
export function gaugeAngle(basalAreaFactor: number, system: AngleCountSystem): Quantity<'bad-factor'> {
  if (!positive(basalAreaFactor) || basalAreaFactor >= land(system)) return refuse('bad-factor');
  return quantity((2 * Math.asin(Math.sqrt(basalAreaFactor / land(system))) * 180) / Math.PI);
}

/**
 * Trees per ha or acre that one counted stem stands for: the factor over the stem's basal area.
 *
 * @returns trees per ha (metric) or per acre (us)
 * @source Bitterlich 1948; Grosenbaugh 1952
 * @example angleCountExpansion(4, 30, 'metric') // 56.5884 per ha
 */
export function angleCountExpansion(basalAreaFactor: number, dbh: number, system: AngleCountSystem): Quantity<AngleRefusal> {
  if (!positive(basalAreaFactor)) return refuse('bad-factor');
  if (!positive(dbh)) return refuse('bad-dbh');
  return quantity(basalAreaFactor / (Math.PI * (dbh / perDistance(system) / 2) ** 2));
}

/**
 * Basal area from the counts at several points: the factor times the mean count.
 *
 * Assumes that borderline stems were settled by their limiting distance. A count of zero is a result.
 *
 * @param counts one per point, 0 or more each
 * @returns m²/ha or ft²/ac; refused without points or for a count below 0
 * @source Bitterlich 1948
 * @example angleCountBasalArea(4, [6, 7, 5]) // 24 m²/ha
 */
export function angleCountBasalArea(basalAreaFactor: number, counts: readonly number[]): Quantity<'bad-factor' | 'no-points' | 'bad-count'> {
  if (!positive(basalAreaFactor)) return refuse('bad-factor');
  if (counts.length === 0) return refuse('no-points');
  if (!counts.every((c) => Number.isFinite(c) && c >= 0)) return refuse('bad-count');
  return quantity((basalAreaFactor * counts.reduce((sum, c) => sum + c, 0)) / counts.length);
}

/** m²/ha in ft²/ac: times 4.356, exact (43,560/10,000). */
export function squareFeetPerAcre(squareMetresPerHa: number): number {
  return (squareMetresPerHa * SQUARE_FEET_PER_ACRE) / SQUARE_METRES_PER_HECTARE;
}
