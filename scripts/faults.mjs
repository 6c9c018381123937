/**
 * npm run faults, npm run faults:kill: simulated tablets (or real browsers) and the real server with everything that
 * can go wrong between them. Ends with one line of JSON; exit code 1 where anything was lost.
 */
import path from 'node:path';
import { checkNode, ensureInstalled } from './lib/ready.mjs';
import { ROOT, run } from './lib/run.mjs';
import { main } from './lib/say.mjs';

await main(async () => {
  checkNode();
  await ensureInstalled();
  const [first, ...rest] = process.argv.slice(2);
  const kill = first === 'kill';
  const { code } = await run(
    process.execPath,
    [
      '--import',
      'tsx',
      `test/sync/${kill ? 'kill' : 'faults'}/main.ts`,
      ...(kill ? rest : process.argv.slice(2)),
    ],
    { env: { TSX_TSCONFIG_PATH: path.join(ROOT, 'test/sync/tsconfig.run.json') } },
  );
  process.exitCode = code;
});
