import 'fake-indexeddb/auto';
import { rmSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { templateMill } from '../faults/template-mill';
import { killBrowsers } from './browser-kills';
import { killServers, synchronousOf } from './server-kills';

/** `npm run faults:kill -- --kills N [--browser-kills M] [--seed S]`: exits 1 where anything was lost. */
async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      kills: { type: 'string', default: '10' },
      'browser-kills': { type: 'string' },
      seed: { type: 'string', default: '1' },
    },
  });
  const kills = Number(values.kills);
  const seed = Number(values.seed);
  const began = performance.now();
  const template = await templateMill();
  try {
    const synchronous = await synchronousOf(template);
    const server = await killServers(kills, seed, template);
    const browser = await killBrowsers(
      Number(values['browser-kills'] ?? kills),
      seed,
      process.env['CHROMIUM_PATH'] ?? 'chromium',
    );
    const lost = server.lost + server.unseen + browser.lost;
    const doubled = server.doubled + browser.doubled;
    const seconds = Math.round((performance.now() - began) / 100) / 10;
    const { misattributed, unsound } = server;
    console.log(
      JSON.stringify({ lost, doubled, misattributed, unsound, synchronous, server, browser, seconds }),
    );
    // Every tenth time the browser's file was damaged: somebody must have noticed and put back what it lost.
    const unnoticed = browser.kills > 10 && browser.recovered === 0;
    const bad = lost + doubled + misattributed + unsound > 0 || unnoticed;
    if (bad || synchronous !== 2 || server.midPush === 0) process.exitCode = 1;
  } finally {
    rmSync(template, { recursive: true, force: true });
  }
}

await main();
