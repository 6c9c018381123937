/** npm run bench:tap: see test/bench/tap.ts. */
import { ensureChromium } from './lib/chromium.mjs';
import { checkNode, ensureBuilt, ensureInstalled } from './lib/ready.mjs';
import { run } from './lib/run.mjs';
import { main } from './lib/say.mjs';

await main(async () => {
  checkNode();
  await ensureInstalled();
  await ensureBuilt();
  const { code } = await run(process.execPath, ['--import', 'tsx', 'test/bench/tap.ts'], {
    env: { TSX_TSCONFIG_PATH: 'api/tsconfig.json', CHROMIUM_PATH: await ensureChromium() },
  });
  process.exitCode = code;
});
