import { refuse } from './refusal';
import type { Refused } from './refusal';
import { slopeFactor } from './slope';

/** End of a distance at the stem: its centre (pith) or the face towards the plot's centre. */
export type StemPoint = 'centre' | 'face';
/** A distance as it was read. */
export type DistanceReading = {
  readonly distanceM: number;
  readonly to: StemPoint;
  /** `slope` distances carry the slope of their own line, %. */
  readonly along: 'horizontal' | { readonly slopePercent: number };
};
export type InOut = {
  readonly kind: 'in' | 'out';
  /** What the tape may read at most for this stem, in the terms of the reading (same end, same slope), m. */
  readonly limitM: number;
  /** Reading less limit, m: how far out; negative when in. */
  readonly beyondM: number;
  /** Horizontal distance to the point by which the project judges, m. */
  readonly horizontalM: number;
  /** Within the project's borderline distance of the limit: to be taped, not sighted. */
  readonly borderline: boolean;
};
export type InOutRefusal = 'bad-distance' | 'bad-slope' | 'bad-limit' | 'bad-dbh' | 'dbh-needed' | 'stem-wider-than-limit';

/**
 * Whether a stem is in, by its measured distance, and the limit that the tape must show.
 *
 * Assumes that the limit is horizontal and that face and centre lie half the DBH apart on the same ray; a leaning or
 * oval stem breaks that by a centimetre or two. Exactly at the limit is in. Readings to the other end than the one the
 * project locks are carried over with half the DBH, slope readings with the secant of their slope.
 *
 * @param reading as taken
 * @param limit radius of the stem's circle or its limiting distance, m, and the point of the stem it is about
 * @param dbhCm needed only where the two ends differ, else null
 * @param borderlineM the project's, m
 * @returns in or out with limit and horizontal distance; refused where a number is no measurement
 * @source standards of the trade: horizontal distance centre to pith at most the radius (common practice, no source)
 * @example judgeInOut({ distanceM: 12.4, to: 'centre', along: { slopePercent: 35 } }, { radiusM: 11.28, about: 'centre' }, null, 0.1) // out, limit 11.9508 m
 */
export function judgeInOut(
  reading: DistanceReading, limit: { readonly radiusM: number; readonly about: StemPoint }, dbhCm: number | null, borderlineM: number,
): InOut | Refused<InOutRefusal> {
  if (!(Number.isFinite(reading.distanceM) && reading.distanceM >= 0)) return refuse('bad-distance');
  if (!(Number.isFinite(limit.radiusM) && limit.radiusM > 0)) return refuse('bad-limit');
  if (dbhCm !== null && !(Number.isFinite(dbhCm) && dbhCm > 0)) return refuse('bad-dbh');
  const sameEnd = reading.to === limit.about;
  if (!sameEnd && dbhCm === null) return refuse('dbh-needed');
  const factor = slopeFactor(reading.along === 'horizontal' ? 0 : reading.along.slopePercent);
  if (factor.kind === 'refused') return refuse('bad-slope');
  // From the reading's end to the end of the limit: the centre lies half a diameter behind the face.
  const carry = sameEnd ? 0 : ((dbhCm ?? 0) / 200) * (limit.about === 'centre' ? 1 : -1);
  if (limit.radiusM - carry <= 0) return refuse('stem-wider-than-limit');
  const limitM = (limit.radiusM - carry) * factor.value;
  const beyondM = reading.distanceM - limitM;
  // A reading typed exactly at the limit must not fall out by the last bit of a square root.
  const isIn = beyondM <= 1e-9;
  return { kind: isIn ? 'in' : 'out', limitM, beyondM, horizontalM: reading.distanceM / factor.value + carry, borderline: Math.abs(beyondM) <= borderlineM };
}
