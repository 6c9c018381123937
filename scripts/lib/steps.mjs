import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { ensureChromium } from './chromium.mjs';
import { ensureBuilt } from './ready.mjs';
import { ROOT, runTool } from './run.mjs';

const REPORTS = path.join(ROOT, 'test-results', 'reports');

/** A step that is one check: its exit code says all. */
function check(name, work) {
  return { name, run: async () => tallyOf((await work()).code === 0) };
}
function tallyOf(passed) {
  return { passed: passed ? 1 : 0, failed: passed ? 0 : 1 };
}

function vitest(name, project) {
  return {
    name,
    run: (args) =>
      counted(`${project}.json`, jestTally, (report) =>
        runTool('vitest', [
          'run',
          '--project',
          project,
          '--passWithNoTests',
          '--reporter=dot',
          '--reporter=json',
          `--outputFile.json=${report}`,
          ...args,
        ]),
      ),
  };
}

/** Runs a test runner that leaves a JSON report; a run that leaves none has failed as a whole. */
async function counted(file, tally, work) {
  const report = path.join(REPORTS, file);
  mkdirSync(REPORTS, { recursive: true });
  rmSync(report, { force: true });
  const { code } = await work(report);
  try {
    const counts = tally(JSON.parse(readFileSync(report, 'utf8')));
    return code !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
  } catch {
    return { passed: 0, failed: 1 };
  }
}

/** Vitest's and ng test's report: Jest's form. A file that could not be read counts as one failure. */
function jestTally(report) {
  const unread = report.testResults.filter((f) => f.status === 'failed' && f.assertionResults.length === 0);
  return { passed: report.numPassedTests, failed: report.numFailedTests + unread.length };
}

function playwrightTally({ stats, errors }) {
  return { passed: stats.expected + stats.flaky, failed: stats.unexpected + errors.length };
}

const TYPES = [
  ['typescript', ['-p', 'shared/tsconfig.json', '--noEmit']],
  ['typescript', ['-p', 'api/tsconfig.json', '--noEmit']],
  ['typescript', ['-p', 'test/tsconfig.json', '--noEmit']],
  ['typescript', ['-p', 'test/sync/tsconfig.json', '--noEmit']],
  ['@angular/compiler-cli', ['-p', 'tsconfig.app.json', '--noEmit']],
];

/** Every part of npm test by its name. */
export const STEPS = {
  lint: [
    check('lint', () => runTool('eslint', ['.', '--max-warnings=0'])),
    check('format', () => runTool('prettier', ['--check', '--log-level=warn', '.'])),
    vitest('arrows', 'lint'),
  ],
  types: [
    check('types', async () => {
      for (const [tool, args] of TYPES) {
        const done = await runTool(tool, args);
        if (done.code !== 0) return done;
      }
      return { code: 0 };
    }),
  ],
  unit: [
    vitest('unit: shared', 'shared'),
    {
      name: 'unit: application',
      run: (args) =>
        counted('app.json', jestTally, (report) =>
          // Its list of built chunks says nothing about tests: shown only where something failed.
          runTool(
            '@angular/cli',
            [
              'test',
              '--watch=false',
              '--progress=false',
              '--reporters=json',
              `--output-file=${report}`,
              ...args,
            ],
            { quiet: true },
          ),
        ),
    },
  ],
  api: [vitest('api', 'api')],
  checks: [vitest('checks', 'checks')],
  sync: [vitest('sync', 'sync')],
  e2e: [
    check('download', async () => {
      await ensureBuilt({ only: 'app' });
      return runTool('tsx', ['scripts/initial-download.ts']);
    }),
    {
      name: 'browser',
      run: async (args) => {
        const chromium = await ensureChromium();
        await ensureBuilt({ only: 'app' });
        return counted('browser.json', playwrightTally, (report) =>
          runTool('@playwright/test', ['test', '--reporter=line,json', ...args], {
            env: { CHROMIUM_PATH: chromium, PLAYWRIGHT_JSON_OUTPUT_NAME: report, FORCE_COLOR: '0' },
          }),
        );
      },
    },
  ],
};
