/** npm run bench:peer: see test/bench/peer/main.mjs. The peer's packages are installed there, and only when asked for. */
import { existsSync } from 'node:fs';
import path from 'node:path';
import { checkNode, ensureInstalled } from './lib/ready.mjs';
import { ROOT, run } from './lib/run.mjs';
import { CannotGoOn, main } from './lib/say.mjs';

await main(async () => {
  checkNode();
  await ensureInstalled();
  const folder = path.join(ROOT, 'test/bench/peer');
  if (!existsSync(path.join(folder, 'node_modules/pouchdb'))) {
    console.log('Installing the peer …');
    const { code } = await run('npm', [
      'install',
      '--prefix',
      folder,
      '--no-audit',
      '--no-fund',
      '--loglevel=error',
    ]);
    if (code !== 0) throw new CannotGoOn('The peer could not be installed; npm says why above.');
  }
  const { code } = await run(
    process.execPath,
    ['--import', 'tsx', 'test/bench/peer/main.mjs', ...process.argv.slice(2)],
    { env: { TSX_TSCONFIG_PATH: path.join(ROOT, 'test/sync/tsconfig.run.json') } },
  );
  process.exitCode = code;
});
