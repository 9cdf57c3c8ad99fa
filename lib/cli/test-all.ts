// npm test: all checks in order, cheap ones first. npm test -- --only unit,integration runs some.
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { parseArgs } from 'node:util';
import { ensureBuilt } from './demo/ensure-built';
import { installChromium } from './install-chromium';
import { pickSteps } from './test-all/steps';
import type { Step } from './test-all/steps';
import { vitestTotals } from './test-all/vitest-totals';

type Outcome = { readonly step: Step; readonly ok: boolean; readonly passed: number; readonly failed: number; readonly skipped: number; readonly note: string; readonly seconds: number };
type Result = Pick<Outcome, 'ok'> & Partial<Pick<Outcome, 'passed' | 'failed' | 'skipped' | 'note'>>;

const root = process.cwd();
const env = { ...process.env, TZ: 'UTC', NEXT_TELEMETRY_DISABLED: '1' };
const windows = process.platform === 'win32';

function runScript(script: string): Result {
  return { ok: spawnSync('npm', ['run', '--silent', script], { cwd: root, env, stdio: 'inherit', shell: windows }).status === 0 };
}

function runVitest(project: string): Result {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'lammas-report-'));
  const report = path.join(folder, 'report.json');
  try {
    const vitest = path.join(root, 'node_modules', 'vitest', 'vitest.mjs');
    const args = [vitest, 'run', '--project', project, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
    const { status } = spawnSync(process.execPath, args, { cwd: root, env, stdio: 'inherit' });
    if (!existsSync(report)) return { ok: false, note: 'vitest left no report' };
    const totals = vitestTotals(JSON.parse(readFileSync(report, 'utf8')));
    return { ok: status === 0 && totals.failed === 0, ...totals, note: totals.skipped > 0 ? `${totals.skipped} skipped` : '' };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function runStep(step: Step, before: readonly Outcome[]): Result {
  switch (step.kind) {
    case 'script':
      return runScript(step.script);
    case 'build': {
      const built = ensureBuilt(root);
      return { ok: built !== 'failed', note: built === 'current' ? 'the build at hand is of these sources' : '' };
    }
    case 'vitest': {
      if (step.name !== 'browser') return runVitest(step.project);
      if (before.some((outcome) => outcome.step.name === 'build' && !outcome.ok)) return { ok: false, note: 'not run: there is no build' };
      const advice = installChromium();
      return advice === null ? runVitest(step.project) : { ok: false, note: `not run: ${advice}` };
    }
  }
}

function summary(outcomes: readonly Outcome[]): string {
  const lines = outcomes.map(({ step, ok, passed, failed, note, seconds }) => {
    const counts = passed + failed > 0 ? `${passed} passed, ${failed} failed` : '';
    return `  ${ok ? 'ok    ' : 'FAILED'}  ${step.does.padEnd(18)} ${`${seconds.toFixed(0)} s`.padStart(6)}  ${[counts, note].filter(Boolean).join('; ')}`.trimEnd();
  });
  return ['', 'Summary', ...lines, ''].join('\n');
}

function main(): number {
  let only: string[];
  try {
    only = parseArgs({ options: { only: { type: 'string', multiple: true, default: [] } } }).values.only;
  } catch (error) {
    console.error(`${error instanceof Error ? error.message : String(error)}\nUsage: npm test [-- --only types,lint,unit,integration,build,browser]`);
    return 2;
  }
  const chosen = pickSteps(only);
  if (typeof chosen === 'string') {
    console.error(chosen);
    return 2;
  }
  const outcomes: Outcome[] = [];
  for (const step of chosen) {
    console.log(`\n── ${step.does} ──`);
    const start = performance.now();
    const result = runStep(step, outcomes);
    outcomes.push({ passed: 0, failed: 0, skipped: 0, note: '', ...result, step, seconds: (performance.now() - start) / 1000 });
  }
  console.log(summary(outcomes));
  const passed = outcomes.reduce((sum, outcome) => sum + outcome.passed, 0);
  // A step that failed without a failed test (types, lint, build) counts as one, so that the last line never hides it.
  const failed = outcomes.reduce((sum, outcome) => sum + (outcome.ok ? 0 : Math.max(1, outcome.failed)), 0);
  console.log(`${passed} passed, ${failed} failed`);
  return failed === 0 ? 0 : 1;
}

process.exitCode = main();
