import { R95_PER_DRMS, R95_PER_R68, R95_PER_SIGMA } from './circular-normal';
import { estimateEffectiveCount } from './effective-count';
import type { EffectiveCount } from './effective-count';
import type { Geographic } from './geographic';
import { isGeographic } from './geographic';
import { keepFixesAtCentre } from './keep-fixes-at-centre';
import { fromPlane, shortTurn, toPlaneNearby } from './local-plane';
import type { PlanePoint } from './local-plane';
import { median } from './median';
import { refuse } from './refusal';
import type { Refused } from './refusal';

/** One position as the receiver gave it. */
export type Fix = Geographic & {
  /** The receiver's own accuracy, m, unscaled: nobody says which share of positions it covers. */
  readonly accuracyM: number;
  /** When it was made, ms since 1970. */
  readonly atMs: number;
};
export type FixRule = {
  readonly centre: 'median' | 'inverse-variance';
  /** The moment of judging, ms since 1970. */
  readonly nowMs: number;
  /** Fewer kept fixes than this are called too few. */
  readonly minimumFixes: number;
  /** A newest fix older than this is called stale, s. */
  readonly staleAfterS: number;
};

export type FixSummary = {
  readonly kind: 'summary';
  readonly centre: Geographic;
  readonly method: FixRule['centre'];
  /** Fixes used for the centre. */
  readonly used: number;
  readonly leftOut: readonly { readonly index: number; readonly why: 'away' | 'not-a-fix'; readonly distanceM: number | null }[];
  /** For the drawing: every sound fix, m from the centre, in the order given. */
  readonly points: readonly (PlanePoint & { readonly index: number; readonly kept: boolean })[];
  readonly scatter: { /** Per axis, about the centre. */ readonly sigmaM: number; /** 95 % radius of a single fix by the scatter seen. */ readonly r95M: number } | null;
  /** Median of the receiver's own values over the fixes used. */
  readonly rawAccuracyM: number;
  readonly rawCoverage: 'unknown';
  /** What the raw value would mean as 95 % radius, if it covers 68 %, or is a root mean square. */
  readonly r95IfSixtyEightM: number;
  readonly r95IfRootMeanSquareM: number;
  /** The radius to judge by: the most pessimistic of the readings above and the scatter. Averaging does not shrink it. */
  readonly r95M: number;
  readonly effective: EffectiveCount;
  readonly newestAgeS: number;
  readonly stale: boolean;
  readonly tooFew: boolean;
};

const isSound = (fix: Fix): boolean => isGeographic(fix) && Number.isFinite(fix.accuracyM) && fix.accuracyM > 0 && Number.isFinite(fix.atMs);

function findCentre(points: readonly PlanePoint[], accuracies: readonly number[], method: FixRule['centre']): PlanePoint {
  switch (method) {
    case 'median':
      return { eastM: median(points.map((p) => p.eastM)), northM: median(points.map((p) => p.northM)) };
    case 'inverse-variance': {
      const weights = accuracies.map((a) => 1 / a ** 2);
      const total = weights.reduce((sum, w) => sum + w, 0);
      const mean = (key: keyof PlanePoint) => points.reduce((sum, p, i) => sum + weights[i]! * p[key], 0) / total;
      return { eastM: mean('eastM'), northM: mean('northM') };
    }
  }
}

/**
 * One position from many fixes: where the plot centre is, how the fixes scatter, and how well it is known.
 *
 * Fixes made away from the centre are left out (see `keepFixesAtCentre`), as are those that are no fix. The precision
 * is deliberately not sigma/sqrt(n): fixes of one stay share their errors, and reflections under trees do not average
 * out. It is the larger of the receiver's own value, read pessimistically, and of the scatter.
 *
 * @param fixes in any order, degrees WGS 84; a repeated fix counts as often as it is given
 * @param rule how to find the centre, and what counts as few and as stale
 * @returns the summary; `no-fixes` for an empty list, `no-sound-fix` when none can be used
 * @source W3C Geolocation (accuracy); Android and Apple references on location accuracy; factors: `circular-normal`
 * @example summariseFixes(fixes, { centre: 'median', nowMs: Date.now(), minimumFixes: 10, staleAfterS: 10 })
 */
export function summariseFixes(fixes: readonly Fix[], rule: FixRule): FixSummary | Refused<'no-fixes' | 'no-sound-fix'> {
  if (fixes.length === 0) return refuse('no-fixes');
  // In time order, for the serial correlation; equal times keep their order.
  const sound = fixes.map((fix, index) => ({ fix, index })).filter(({ fix }) => isSound(fix)).sort((a, b) => a.fix.atMs - b.fix.atMs);
  const first = sound[0]?.fix;
  if (first === undefined) return refuse('no-sound-fix');
  const pivot: Geographic = {
    lat: median(sound.map(({ fix }) => fix.lat)),
    lon: shortTurn(0, first.lon + median(sound.map(({ fix }) => shortTurn(first.lon, fix.lon)))),
  };
  const inPlane = sound.map(({ fix }) => toPlaneNearby(pivot, fix));
  const kept = keepFixesAtCentre(inPlane);
  const usedPoints = inPlane.filter((_, i) => kept[i]);
  const accuracies = sound.filter((_, i) => kept[i]).map(({ fix }) => fix.accuracyM);
  const middle = findCentre(usedPoints, accuracies, rule.centre);

  const about = (p: PlanePoint): PlanePoint => ({ eastM: p.eastM - middle.eastM, northM: p.northM - middle.northM });
  const points = sound.map(({ index }, i) => ({ index, kept: kept[i]!, ...about(inPlane[i]!) })).sort((a, b) => a.index - b.index);
  const n = usedPoints.length;
  const sumOfSquares = usedPoints.map(about).reduce((sum, p) => sum + p.eastM ** 2 + p.northM ** 2, 0);
  const sigmaM = n > 1 ? Math.sqrt(sumOfSquares / (2 * (n - 1))) : null;
  const rawAccuracyM = median(accuracies);
  const newestMs = sound.at(-1)!.fix.atMs;
  const newestAgeS = (rule.nowMs - newestMs) / 1000;
  const soundIndexes = new Set(sound.map(({ index }) => index));
  return {
    kind: 'summary',
    centre: fromPlane(pivot, middle), method: rule.centre, used: n, points,
    leftOut: [
      ...points.filter((p) => !p.kept).map((p) => ({ index: p.index, why: 'away' as const, distanceM: Math.hypot(p.eastM, p.northM) })),
      ...fixes.flatMap((_, index) => (soundIndexes.has(index) ? [] : [{ index, why: 'not-a-fix' as const, distanceM: null }])),
    ].sort((a, b) => a.index - b.index),
    scatter: sigmaM === null ? null : { sigmaM, r95M: R95_PER_SIGMA * sigmaM },
    rawAccuracyM, rawCoverage: 'unknown',
    r95IfSixtyEightM: R95_PER_R68 * rawAccuracyM,
    r95IfRootMeanSquareM: R95_PER_DRMS * rawAccuracyM,
    r95M: Math.max(R95_PER_DRMS * rawAccuracyM, sigmaM === null ? 0 : R95_PER_SIGMA * sigmaM),
    effective: estimateEffectiveCount(usedPoints),
    newestAgeS, stale: newestAgeS > rule.staleAfterS, tooFew: n < rule.minimumFixes,
  };
}
