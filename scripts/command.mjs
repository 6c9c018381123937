/** npm run rebuild, npm run seed: a command of the server on the data in DATA_DIR, built first where that is stale. */
import { checkNode, ensureBuilt, ensureInstalled } from './lib/ready.mjs';
import { run } from './lib/run.mjs';
import { main } from './lib/say.mjs';

const [module, ...args] = process.argv.slice(2);
await main(async () => {
  checkNode();
  await ensureInstalled();
  await ensureBuilt({ only: 'server' });
  const { code } = await run(process.execPath, [
    '--enable-source-maps',
    `dist/server/api/${module}.js`,
    ...args,
  ]);
  process.exitCode = code;
});
