import { existsSync, readFileSync } from 'node:fs';

/** package.json lies one folder up from the sources and three up from the compiled files. */
const PLACES = ['../package.json', '../../../package.json'];

function readVersion(): string {
  for (const place of PLACES) {
    const file = new URL(place, import.meta.url);
    if (!existsSync(file)) continue;
    const { version } = JSON.parse(readFileSync(file, 'utf8')) as { version?: string };
    if (version) return version;
  }
  return 'unknown';
}

/** Of the application, as package.json has it. */
export const VERSION = readVersion();
