import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { CannotStart } from '../cannot-start.js';

export interface DataFolderLock {
  release(): void;
}

/**
 * One process at a time may have the data folder: a server, a seeding, a rebuild or a restore. The lock is SQLite's
 * own on a file beside the book, so the operating system frees it however its holder ends: nothing goes stale and no
 * process id is trusted. The id written beside it is for the message alone.
 */
export function lockDataFolder(dataDir: string): DataFolderLock {
  const holder = join(dataDir, 'in-use.txt');
  const database = openLockFile(join(dataDir, 'in-use.lock'));
  try {
    database.exec('BEGIN EXCLUSIVE');
  } catch (error) {
    database.close();
    if (!(error instanceof Database.SqliteError) || !error.code.startsWith('SQLITE_BUSY')) throw error;
    throw new CannotStart(
      `The data folder ${dataDir} is in use by ${nameOf(holder)}. Stop that first; nothing was changed.`,
    );
  }
  writeFileSync(holder, `${process.pid}\n`);
  return {
    release: () => {
      if (!database.open) return;
      rmSync(holder, { force: true });
      database.exec('ROLLBACK');
      database.close();
    },
  };
}

function openLockFile(file: string): Database.Database {
  try {
    return new Database(file, { timeout: 0 });
  } catch (error) {
    throw whyNoDatabase(error, file);
  }
}

function nameOf(holder: string): string {
  try {
    return `a running server or command (process ${readFileSync(holder, 'utf8').trim()})`;
  } catch {
    return 'a running server or command';
  }
}

/** The sentence for a database that cannot be opened at all; anything unknown is passed on as it is. */
export function whyNoDatabase(error: unknown, file: string): unknown {
  const message = error instanceof Error ? error.message : '';
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  if (/bindings file/i.test(message) || code === 'ERR_DLOPEN_FAILED' || code === 'MODULE_NOT_FOUND')
    return new CannotStart(
      `The SQLite driver is not built for this Node (${process.version}). Run "npm rebuild better-sqlite3"; ` +
        'that needs a C++ compiler, make and Python (on Debian: apt-get install build-essential python3).',
    );
  if (/^SQLITE_(CANTOPEN|READONLY|PERM|AUTH)/.test(code) || ['EACCES', 'EROFS', 'EPERM'].includes(code))
    return new CannotStart(`${file} cannot be written. Give the server's user the right to write there.`);
  if (code === 'SQLITE_NOTADB' || code === 'SQLITE_CORRUPT')
    return new CannotStart(
      `${file} is not a sound SQLite file. Nothing was changed; put the last backup in its place.`,
    );
  return error;
}
