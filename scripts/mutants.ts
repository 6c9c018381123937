import { fileURLToPath } from 'node:url';
import { createVitest, type Vitest } from 'vitest/node';
import { mutate, specsOf, type Mutant } from '../test/mutants/mutant.js';
import { MUTANTS } from '../test/mutants/mutants.js';

/**
 * Puts the mutants of test/mutants/ into shared/ one at a time, in memory, and runs the specs that should
 * notice. Fails where one survives. `npm run mutants -- weft` takes those whose file or reason has the word in it.
 */
const ROOT = fileURLToPath(new URL('..', import.meta.url));
const wanted = process.argv.slice(2);

let current: Mutant | null = null;
const pathOf = (mutant: Mutant) => `${ROOT}shared/${mutant.file}`;

const vitest = await createVitest(
  'test',
  {
    config: false,
    root: ROOT,
    watch: false,
    globals: true,
    include: ['shared/**/*.spec.ts', 'test/checks/**/*.spec.ts'],
    testTimeout: 60_000,
    reporters: [{}],
    // The first failure is enough.
    bail: 1,
  },
  {
    plugins: [
      {
        name: 'mutant',
        enforce: 'pre',
        transform: (code, id) => (current && id === pathOf(current) ? mutate(code, current) : null),
      },
    ],
  },
);

/** How many specs failed of those that should notice; null: none were found to run. */
async function failures(mutant: Mutant | null, specs: readonly string[]): Promise<number | null> {
  const files = await filesOf(vitest, specs);
  if (files.length === 0) return null;
  current = mutant;
  if (mutant) vitest.invalidateFile(pathOf(mutant));
  const { testModules } = await vitest.runTestSpecifications(files);
  if (mutant) vitest.invalidateFile(pathOf(mutant));
  const failed = testModules.flatMap((one) => [...one.children.allTests('failed')]).length;
  // A file that cannot even be read is no spec that noticed.
  return testModules.some((one) => one.errors().length > 0) && failed === 0 ? null : failed;
}

async function filesOf(runner: Vitest, specs: readonly string[]) {
  const all = await runner.globTestSpecifications();
  return all.filter(({ moduleId }) => specs.some((spec) => moduleId.includes(spec)));
}

const mutants = MUTANTS.filter(({ file, why }) => wanted.every((word) => `${file} ${why}`.includes(word)));
const unharmed = await failures(null, [...new Set(mutants.flatMap(specsOf))]);
if (unharmed !== 0) {
  console.error('The specs fail, or are not there, before anything is changed. Mend that first.');
  process.exit(1);
}
let survivors = 0;
for (const mutant of mutants) {
  const failed = await failures(mutant, specsOf(mutant));
  const killed = failed !== null && failed > 0;
  if (!killed) survivors += 1;
  console.log(`${killed ? 'killed  ' : 'SURVIVED'}  ${mutant.file}: ${mutant.why}`);
}
await vitest.close();
console.log(`\n${mutants.length - survivors} of ${mutants.length} mutants killed.`);
process.exit(survivors > 0 || mutants.length === 0 ? 1 : 0);
