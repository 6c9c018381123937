/**
 * npm test: lint, types, unit, API, checks, sync, browser in turn, the seconds of each, and at the end what passed and
 * what failed. Parts by name: `node scripts/test.mjs e2e --grep story`.
 */
import { checkNode, ensureInstalled } from './lib/ready.mjs';
import { CannotGoOn, main, seconds } from './lib/say.mjs';
import { STEPS } from './lib/steps.mjs';

await main(async () => {
  checkNode();
  const [part, ...args] = process.argv.slice(2);
  if (part && !STEPS[part])
    throw new CannotGoOn(`There is no part ${part}: ${Object.keys(STEPS).join(', ')}.`);
  // The whole has to stay short enough to be run before every change; the part of its own leaves nothing out.
  if (!part) process.env.E2E_SHORT = 'yes';
  await ensureInstalled();
  const steps = part ? STEPS[part] : Object.values(STEPS).flat();
  const began = Date.now();
  const rows = [];
  const sum = { passed: 0, failed: 0 };
  for (const step of steps) {
    console.log(`\n— ${step.name}`);
    const stepBegan = Date.now();
    const tally = await step.run(args).catch((error) => {
      if (!(error instanceof CannotGoOn)) throw error;
      console.error(error.message);
      return { passed: 0, failed: 1 };
    });
    sum.passed += tally.passed;
    sum.failed += tally.failed;
    rows.push(
      `${step.name.padEnd(20)} ${seconds(stepBegan).padStart(8)}  ${tally.passed} passed, ${tally.failed} failed`,
    );
  }
  console.log(`\n${rows.join('\n')}\n${'all'.padEnd(20)} ${seconds(began).padStart(8)}\n`);
  console.log(`${sum.passed} passed, ${sum.failed} failed`);
  if (sum.failed > 0 || sum.passed === 0) process.exitCode = 1;
});
