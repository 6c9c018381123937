/** npm run build: the application into dist/app, the server into dist/server. */
import { checkNode, ensureBuilt, ensureInstalled } from './lib/ready.mjs';
import { main } from './lib/say.mjs';

await main(async () => {
  checkNode();
  await ensureInstalled();
  await ensureBuilt({ force: true });
});
