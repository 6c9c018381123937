import { accessSync, constants } from 'node:fs';
import path from 'node:path';
import { run } from './run.mjs';
import { CannotGoOn } from './say.mjs';

const NAMES = ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome'];

/** CHROMIUM_PATH, or a Chromium on the PATH; null: none. */
export function findChromium() {
  const named = process.env.CHROMIUM_PATH;
  if (named) return isProgram(named) ? named : null;
  for (const folder of (process.env.PATH ?? '').split(path.delimiter))
    for (const name of NAMES) if (isProgram(path.join(folder, name))) return path.join(folder, name);
  return null;
}

function isProgram(file) {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** A Chromium for the browser tests: found, or installed from Debian's packages where apt and the right to it are there. */
export async function ensureChromium() {
  const found = findChromium();
  if (found) return found;
  if (process.env.CHROMIUM_PATH)
    throw new CannotGoOn(`CHROMIUM_PATH is ${process.env.CHROMIUM_PATH}, but no program is there.`);
  const aptIsThere = (await run('apt-get', ['--version'], { quiet: 'always' })).code === 0;
  if (aptIsThere && process.getuid?.() === 0) {
    console.log('Installing Chromium for the browser tests …');
    await run('apt-get', ['update', '-qq'], { quiet: true });
    await run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], { quiet: true });
    const installed = findChromium();
    if (installed) return installed;
  }
  throw new CannotGoOn(
    'The browser tests need Chromium, and there is none on the PATH. Install one, or name one: CHROMIUM_PATH=/usr/bin/chromium npm test.',
  );
}
