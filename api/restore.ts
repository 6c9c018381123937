import { resolve } from 'node:path';
import { restoreBook } from './backup/restore-book.js';
import { CannotStart } from './cannot-start.js';
import { BadSetting, readSettings } from './settings.js';

/** `npm run restore -- FILE`: puts a backup in the book's place; what was there is kept. */
function main(): void {
  const settings = readSettings(process.env);
  const [file] = process.argv.slice(2);
  if (file === undefined)
    throw new CannotStart('Name the backup: npm run restore -- data/backups/book-20260310-020000.sqlite');
  const { entries, replaced } = restoreBook(settings.dataDir, resolve(file), Date.now());
  console.log(`The book holds the ${entries} entries of ${file} now; it was opened and verified.`);
  if (replaced !== null) console.log(`What was in its place is kept: ${replaced}.`);
  console.log('Start the server again: each tablet then sends what the backup lacks, of the last 14 days.');
}

try {
  main();
} catch (error) {
  if (error instanceof CannotStart || error instanceof BadSetting) console.error(error.message);
  else console.error(error);
  process.exitCode = 1;
}
