/**
 * npm run demo: everything from a fresh clone to the demo mill in a browser. Only Node's own modules until the packages
 * are installed. `-- --fresh` starts the demo mill anew.
 */
import path from 'node:path';
import {
  checkFolder,
  checkNode,
  checkPort,
  ensureBuilt,
  ensureInstalled,
  portSetting,
} from './lib/ready.mjs';
import { ROOT, run, stay } from './lib/run.mjs';
import { CannotGoOn, main, seconds } from './lib/say.mjs';

await main(async () => {
  const began = Date.now();
  checkNode();
  const port = portSetting();
  const dataDir = path.resolve(ROOT, process.env.DATA_DIR?.trim() || 'data-demo');
  checkFolder(dataDir);
  await checkPort(port, 'npm run demo');
  await ensureInstalled();
  await ensureBuilt();
  const env = { DATA_DIR: dataDir, PORT: String(port), LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn' };
  const seeded = await run(
    process.execPath,
    ['--enable-source-maps', 'dist/server/api/demo/seed.js', ...process.argv.slice(2)],
    { env },
  );
  if (seeded.code !== 0) throw new CannotGoOn('The demo mill could not be made; the reason stands above.');
  console.log(`Ready after ${seconds(began)}. Ctrl+C ends it; npm run demo starts it again.\n`);
  process.exitCode = await stay(['--enable-source-maps', 'dist/server/api/main.js'], env);
});
