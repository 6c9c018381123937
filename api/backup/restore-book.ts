import { copyFileSync, existsSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import Database from 'better-sqlite3';
import { v4 as uuid } from 'uuid';
import { CannotStart } from '../cannot-start.js';
import { lockDataFolder } from '../database/data-folder-lock.js';
import { MIGRATIONS } from '../database/data-source.js';
import { bookFile, prepareDataFolder } from '../database/prepare-database.js';
import { copyPhotos, photoFolder } from '../files/photo-files.js';
import { stampOf } from './backup-files.js';
import { flush } from './take-backup.js';
import { UnsoundBook, verifyBook, type BookCounts } from './verify-book.js';

export interface RestoredBook extends BookCounts {
  /** Where the book lies that was in its place; null: there was none. */
  readonly replaced: string | null;
}

/**
 * Puts a backup in the book's place. Refuses while a server or a command has the data folder, and a file that is not
 * sound; nothing is changed then. The book that was there is kept. The restored one gets an epoch of its own, by which
 * every tablet notices and sends again what the backup lacks. Throws `CannotStart` with a sentence.
 */
export function restoreBook(dataDir: string, backup: string, now: number): RestoredBook {
  prepareDataFolder(dataDir);
  const lock = lockDataFolder(dataDir);
  const made = `${bookFile(dataDir)}.restored`;
  try {
    if (!existsSync(backup)) throw new CannotStart(`There is no file ${backup}. Nothing was changed.`);
    copyFileSync(backup, made);
    const counts = verifyBook(made);
    giveNewEpoch(made);
    flush(made);
    const replaced = keepReplaced(dataDir, now);
    // Beside the backup, wherever it was brought from: photos that this folder lacks.
    copyPhotos(join(dirname(backup), 'photos'), photoFolder(dataDir));
    renameSync(made, bookFile(dataDir));
    flush(dataDir);
    return { ...counts, replaced };
  } catch (error) {
    if (!(error instanceof UnsoundBook)) throw error;
    throw new CannotStart(
      `${error.message.replace(made, backup)} Nothing was changed; choose another backup.`,
    );
  } finally {
    rmSync(made, { force: true });
    lock.release();
  }
}

function giveNewEpoch(file: string): void {
  const database = new Database(file, { fileMustExist: true });
  try {
    refuseNewer(database, file);
    database.prepare(`INSERT OR REPLACE INTO "meta" ("key", "value") VALUES ('epoch', ?)`).run(uuid());
  } finally {
    database.close();
  }
}

/** An older backup is brought up to date when the server starts; one of a newer program cannot be. */
function refuseNewer(database: Database.Database, file: string): void {
  const known = new Set(MIGRATIONS.map(({ name }) => name));
  const run = database.prepare(`SELECT "name" FROM "migrations"`).pluck().all() as string[];
  const unknown = run.find((name) => !known.has(name));
  if (unknown !== undefined)
    throw new UnsoundBook(`${file} was made by a newer version of Shedbeat (${unknown}).`);
}

function keepReplaced(dataDir: string, now: number): string | null {
  const book = bookFile(dataDir);
  if (!existsSync(book)) return null;
  const folder = join(dataDir, `replaced-${stampOf(now)}`);
  mkdirSync(folder, { recursive: true, mode: 0o750 });
  // With its write-ahead log, which may hold what was written last.
  for (const file of [book, `${book}-wal`, `${book}-shm`])
    if (existsSync(file)) renameSync(file, join(folder, basename(file)));
  return join(folder, basename(book));
}
