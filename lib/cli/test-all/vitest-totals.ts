import { z } from 'zod';

const reportSchema = z.looseObject({
  numPassedTests: z.int(),
  numFailedTests: z.int(),
  numPendingTests: z.int(),
  testResults: z.array(z.looseObject({ name: z.string(), status: z.string(), message: z.string().default(''), assertionResults: z.array(z.looseObject({ status: z.string() })) })),
});

export type VitestTotals = { readonly passed: number; readonly failed: number; readonly skipped: number };

/**
 * Totals of a report by vitest's JSON reporter. A file that failed without a failed test (it did not even load) counts as
 * one failed: its tests are missing from the report, and nobody should read "0 failed". Errors: not such a report.
 */
export function vitestTotals(report: unknown): VitestTotals {
  const { numPassedTests, numFailedTests, numPendingTests, testResults } = reportSchema.parse(report);
  const unloaded = testResults.filter(({ status, assertionResults }) => status === 'failed' && !assertionResults.some((test) => test.status === 'failed'));
  return { passed: numPassedTests, failed: numFailedTests + unloaded.length, skipped: numPendingTests };
}
