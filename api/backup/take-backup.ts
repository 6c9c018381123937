import { closeSync, fsyncSync, openSync, renameSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import type Database from 'better-sqlite3';
import type { DataSource } from 'typeorm';
import type { BetterSqlite3Driver } from 'typeorm/driver/better-sqlite3/BetterSqlite3Driver.js';
import type { Deps } from '../deps.js';
import { copyPhotos, photoFolder } from '../files/photo-files.js';
import { backupFolder, backupName, copiedPhotosFolder, listBackups } from './backup-files.js';
import { countsOf, UnsoundBook, verifyBook, type BookCounts } from './verify-book.js';

export interface TakenBackup extends BookCounts {
  readonly file: string;
}

/** Pages a step: between two of them the server answers whoever only reads. */
const PAGES = 1_000;

/**
 * Copies the book beside itself with its photos, verifies the copy by opening it, and drops the oldest beyond `settings.backupsKept`.
 * Runs on the writer's own connection, in its turn: from another one, each write starts the copy over. A copy that is
 * not finished, or not sound, never has a backup's name.
 */
export async function takeBackup(deps: Pick<Deps, 'writer' | 'settings' | 'now'>): Promise<TakenBackup> {
  const { dataDir, backupsKept } = deps.settings;
  const file = join(backupFolder(dataDir), backupName(deps.now()));
  const part = `${file}.part`;
  try {
    const held = await deps.writer.exclusive(async (dataSource) => {
      const book = connectionOf(dataSource);
      await book.backup(part, { progress: () => PAGES });
      return countsOf(book);
    });
    const counts = verifyBook(part);
    if (JSON.stringify(counts) !== JSON.stringify(held))
      throw new UnsoundBook(`${part} holds ${JSON.stringify(counts)}, the book ${JSON.stringify(held)}.`);
    flush(part);
    // After the book: whatever photo it names lies there by now.
    copyPhotos(photoFolder(dataDir), copiedPhotosFolder(dataDir));
    renameSync(part, file);
    flush(backupFolder(dataDir));
    for (const old of listBackups(dataDir).slice(0, -backupsKept)) rmSync(old.file);
    return { file, ...counts };
  } finally {
    for (const left of [part, `${part}-wal`, `${part}-shm`, `${part}-journal`]) rmSync(left, { force: true });
  }
}

function connectionOf(dataSource: DataSource): Database.Database {
  return (dataSource.driver as BetterSqlite3Driver).databaseConnection as Database.Database;
}

/** On the disk, not only in the system's cache. */
export function flush(path: string): void {
  const handle = openSync(path, 'r');
  try {
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
}
