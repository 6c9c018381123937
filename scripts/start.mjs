/** npm start: a mill of one's own, in DATA_DIR. Installs and builds what is missing. */
import path from 'node:path';
import {
  checkFolder,
  checkNode,
  checkPort,
  ensureBuilt,
  ensureInstalled,
  portSetting,
} from './lib/ready.mjs';
import { ROOT, stay } from './lib/run.mjs';
import { main } from './lib/say.mjs';

await main(async () => {
  checkNode();
  const port = portSetting();
  const dataDir = path.resolve(ROOT, process.env.DATA_DIR?.trim() || 'data');
  checkFolder(dataDir);
  await checkPort(port, 'npm start');
  await ensureInstalled();
  await ensureBuilt();
  process.exitCode = await stay(['--enable-source-maps', 'dist/server/api/main.js'], {
    DATA_DIR: dataDir,
    PORT: String(port),
  });
});
