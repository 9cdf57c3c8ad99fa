import { describe, expect, it } from 'vitest';
import { pickSteps } from '@/lib/cli/test-all/steps';
import { vitestTotals } from '@/lib/cli/test-all/vitest-totals';

const report = (testResults: { status: string; tests: readonly string[] }[]) => {
  const count = (status: string) => testResults.flatMap(({ tests }) => tests).filter((test) => test === status).length;
  return {
    numPassedTests: count('passed'), numFailedTests: count('failed'), numPendingTests: count('pending'), success: false,
    testResults: testResults.map(({ status, tests }, i) => ({ name: `file-${i}`, status, message: '', assertionResults: tests.map((test) => ({ status: test, title: 't' })) })),
  };
};

describe('npm test', () => {
  it('adds up the tests of a report', () => {
    expect(vitestTotals(report([{ status: 'passed', tests: ['passed', 'passed', 'pending'] }, { status: 'failed', tests: ['passed', 'failed'] }])))
      .toEqual({ passed: 3, failed: 1, skipped: 1 });
  });

  it('a file that did not load counts as failed, since its tests are missing', () => {
    expect(vitestTotals(report([{ status: 'failed', tests: [] }, { status: 'passed', tests: ['passed'] }]))).toMatchObject({ passed: 1, failed: 1 });
  });

  it('a report of another kind is an error, never zero', () => {
    expect(() => vitestTotals({ tests: 12 })).toThrow();
  });

  it('--only picks steps, in running order however they are named', () => {
    const names = (only: string[]) => {
      const picked = pickSteps(only);
      return typeof picked === 'string' ? picked : picked.map(({ name }) => name);
    };
    expect(names([])).toEqual(['types', 'lint', 'unit', 'integration', 'build', 'browser']);
    expect(names(['browser,unit', 'types'])).toEqual(['types', 'unit', 'browser']);
    expect(names(['units'])).toMatch(/no step units/);
  });
});
