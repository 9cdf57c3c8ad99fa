const ROUND_DAYS = 366;

/**
 * Visits begun after this belong to the round under way; earlier ones are earlier visits. A round of field work is
 * taken to last no longer than a year (common practice, no source).
 */
export function roundStart(now: number = Date.now()): string {
  return new Date(now - ROUND_DAYS * 86_400_000).toISOString();
}
