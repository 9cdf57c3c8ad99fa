import type { FixSummary } from './summarise-fixes';

/** What a project asks of a plot's position. */
export type PositionRule = {
  /** 95 % radius that still serves the use, m. */
  readonly maximumR95M: number;
  readonly waitingTimeS: number;
};
export type PositionShortfall = 'no-position' | 'radius-too-large' | 'too-few-fixes' | 'stale';
export type PositionVerdict = {
  readonly verdict: 'met' | 'not-met' | 'accepted-by-waiting';
  /** What falls short; empty exactly when the rule is met. */
  readonly shortfalls: readonly PositionShortfall[];
  /** Stays with the visit for the analyst, whoever accepted. */
  readonly flagged: boolean;
  /** A person may accept it now, with a reason. */
  readonly needsReason: boolean;
  /** Until the app accepts by itself, s; 0 when there is nothing to wait for. */
  readonly remainingS: number;
};

/**
 * Whether a position serves the project's use, and who may accept it if not.
 *
 * A poor position is accepted by a person with a reason, or by the app once the waiting time is over; flagged either
 * way. With no position at all there is nothing to accept by waiting.
 *
 * @param summary from `summariseFixes`, or null when there is none
 * @param rule the project's
 * @param waitedSeconds since arrival at the plot
 * @returns verdict and codes; the words belong to the screen
 * @source the product's design, "Position"
 * @example judgePosition(summary, { maximumR95M: 15, waitingTimeS: 600 }, 700)
 */
export function judgePosition(summary: FixSummary | null, rule: PositionRule, waitedSeconds: number): PositionVerdict {
  const shortfalls: readonly PositionShortfall[] = summary === null ? ['no-position'] : [
    // Written so that a radius which is not a number falls short.
    ...(summary.r95M <= rule.maximumR95M ? [] : ['radius-too-large' as const]),
    ...(summary.tooFew ? ['too-few-fixes' as const] : []),
    ...(summary.stale ? ['stale' as const] : []),
  ];
  if (shortfalls.length === 0) return { verdict: 'met', shortfalls, flagged: false, needsReason: false, remainingS: 0 };
  const remainingS = Math.max(0, rule.waitingTimeS - waitedSeconds);
  const byWaiting = summary !== null && waitedSeconds >= rule.waitingTimeS;
  return {
    verdict: byWaiting ? 'accepted-by-waiting' : 'not-met', shortfalls, flagged: true, needsReason: !byWaiting,
    remainingS: summary === null ? 0 : remainingS,
  };
}
