/**
 * npm run faults, npm run faults:kill: simulated tablets (or a real browser's storage) and the real server, with
 * everything that can go wrong between them. Ends with one line of JSON; exit code 1 where anything was lost.
 */
import path from 'node:path';
import { ensureChromium } from './lib/chromium.mjs';
import { checkNode, ensureBuilt, ensureInstalled } from './lib/ready.mjs';
import { ROOT, run } from './lib/run.mjs';
import { main } from './lib/say.mjs';

await main(async () => {
  checkNode();
  await ensureInstalled();
  const args = process.argv.slice(2);
  const kill = args[0] === 'kill';
  const env = { TSX_TSCONFIG_PATH: path.join(ROOT, 'test/sync/tsconfig.run.json') };
  if (kill) {
    await ensureBuilt({ only: 'server' });
    env.CHROMIUM_PATH = await ensureChromium();
  }
  const { code } = await run(
    process.execPath,
    ['--import', 'tsx', `test/sync/${kill ? 'kill' : 'faults'}/main.ts`, ...(kill ? args.slice(1) : args)],
    { env },
  );
  process.exitCode = code;
});
