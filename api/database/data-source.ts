import { DataSource } from 'typeorm';
import type Database from 'better-sqlite3';
import { ENTITIES } from './entities/index.js';
import { FirstBook1764547200000 } from './migrations/1764547200000-first-book.js';
import { MarksAndTablets1764590400000 } from './migrations/1764590400000-marks-and-tablets.js';
import { SetUp1764600000000 } from './migrations/1764600000000-set-up.js';
import { LettersAndLinks1764605000000 } from './migrations/1764605000000-letters-and-links.js';
import { Tackling1764610000000 } from './migrations/1764610000000-tackling.js';
import { ShiftsOnceThere1764615000000 } from './migrations/1764615000000-shifts-once-there.js';

/** Oldest first. */
export const MIGRATIONS = [
  FirstBook1764547200000,
  MarksAndTablets1764590400000,
  SetUp1764600000000,
  LettersAndLinks1764605000000,
  Tackling1764610000000,
  ShiftsOnceThere1764615000000,
];

/**
 * A connection to the book's SQLite file. The writer's is opened once a process; readers open theirs read-only in a
 * worker thread. Durability: WAL with synchronous=FULL, so that an acknowledged entry survives a power cut.
 */
export function createDataSource(file: string, options: { readonly?: boolean } = {}): DataSource {
  return new DataSource({
    type: 'better-sqlite3',
    database: file,
    entities: ENTITIES,
    migrations: MIGRATIONS,
    migrationsTransactionMode: 'each',
    enableWAL: !options.readonly,
    readonly: options.readonly ?? false,
    fileMustExist: options.readonly ?? false,
    prepareDatabase: (database: Database.Database) => {
      database.pragma('foreign_keys = ON');
      database.pragma('busy_timeout = 2000');
      if (!options.readonly) {
        database.pragma('journal_mode = WAL');
        database.pragma('synchronous = FULL');
      }
    },
  });
}
