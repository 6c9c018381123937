import { existsSync, rmSync } from 'node:fs';
import Database from 'better-sqlite3';
import { CannotStart } from '../cannot-start.js';
import { lockDataFolder, whyNoDatabase } from '../database/data-folder-lock.js';
import { bookFile, prepareDataFolder } from '../database/prepare-database.js';
import { SEEDED_AT, SEEDED_WHOLE } from './seed-marks.js';

/**
 * Takes a demo's book away where it was left half made, or where a fresh one is asked for. A book that is not a demo's
 * is never touched. Only while nobody else has the folder.
 */
export function makeRoom(dataDir: string, { fresh }: { fresh: boolean }): void {
  prepareDataFolder(dataDir);
  const lock = lockDataFolder(dataDir);
  try {
    const file = bookFile(dataDir);
    const found = whatIsThere(file);
    if (found === 'other')
      throw new CannotStart(
        `The folder ${dataDir} holds a mill that is not the demo. Nothing was changed; name another folder by DATA_DIR.`,
      );
    if (found === 'half' || (found === 'whole' && fresh))
      for (const name of [file, `${file}-wal`, `${file}-shm`]) rmSync(name, { force: true });
  } finally {
    lock.release();
  }
}

function whatIsThere(file: string): 'nothing' | 'half' | 'whole' | 'other' {
  if (!existsSync(file)) return 'nothing';
  try {
    const database = new Database(file, { readonly: true });
    try {
      const has = (sql: string, ...values: string[]): boolean =>
        database.prepare(sql).get(...values) !== undefined;
      const isTable = (name: string): boolean =>
        has(`SELECT 1 FROM sqlite_master WHERE "type" = 'table' AND "name" = ?`, name);
      if (!isTable('mill') || !isTable('meta')) return 'nothing';
      if (has(`SELECT 1 FROM "meta" WHERE "key" = ?`, SEEDED_WHOLE)) return 'whole';
      if (has(`SELECT 1 FROM "meta" WHERE "key" = ?`, SEEDED_AT)) return 'half';
      return has(`SELECT 1 FROM "mill"`) ? 'other' : 'nothing';
    } finally {
      database.close();
    }
  } catch (error) {
    throw whyNoDatabase(error, file);
  }
}
