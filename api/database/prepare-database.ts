import { accessSync, constants, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import { v4 as uuid } from 'uuid';
import { CannotStart } from '../cannot-start.js';
import { createDataSource } from './data-source.js';
import { whyNoDatabase } from './data-folder-lock.js';
import { MetaRow } from './entities/index.js';

export interface PreparedDatabase {
  /** The writer's connection: the only one in the process that may write. */
  readonly writing: DataSource;
  /** For small reads on a request's path. */
  readonly reads: DataSource;
  /** Names this book: made with it, so that devices notice another one in its place. */
  readonly epoch: string;
  close(): Promise<void>;
}

/** The book's SQLite file. */
export function bookFile(dataDir: string): string {
  return join(dataDir, 'book.sqlite');
}

/** Makes the data folder if need be and sees that it can be written. */
export function prepareDataFolder(dataDir: string): void {
  try {
    mkdirSync(dataDir, { recursive: true, mode: 0o750 });
    accessSync(dataDir, constants.W_OK | constants.X_OK);
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new CannotStart(
      `The data folder ${dataDir} cannot be written (${why}). Set DATA_DIR to a folder that the server's user may write.`,
    );
  }
}

/**
 * Opens the book, brings its tables up to date and sees that what was promised holds: foreign keys sound, WAL on,
 * every commit on the disk before it is acknowledged.
 */
export async function prepareDatabase(dataDir: string): Promise<PreparedDatabase> {
  const file = bookFile(dataDir);
  const writing = createDataSource(file);
  try {
    await writing.initialize();
    await writing.runMigrations();
    await assertSound(writing);
    const epoch = await readEpoch(writing);
    const reads = createDataSource(file, { readonly: true });
    await reads.initialize();
    return {
      writing,
      reads,
      epoch,
      close: async () => {
        await reads.destroy();
        await writing.destroy();
      },
    };
  } catch (error) {
    if (writing.isInitialized) await writing.destroy();
    throw whyNoDatabase(causeOf(error), file);
  }
}

async function assertSound(writing: DataSource): Promise<void> {
  const broken: unknown[] = await writing.query('PRAGMA foreign_key_check');
  if (broken.length > 0)
    throw new CannotStart(
      `The book has ${broken.length} rows that point at nothing (foreign_key_check). Nothing was changed; put the last backup in its place.`,
    );
  const [mode]: { journal_mode: string }[] = await writing.query('PRAGMA journal_mode');
  const [synchronous]: { synchronous: number }[] = await writing.query('PRAGMA synchronous');
  if (mode?.journal_mode !== 'wal' || synchronous?.synchronous !== 2)
    throw new CannotStart(
      `The book must be in WAL mode with synchronous=FULL, but is ${mode?.journal_mode} with ${synchronous?.synchronous}. ` +
        'Put DATA_DIR on a local disk: network file systems cannot keep this promise.',
    );
}

async function readEpoch(writing: DataSource): Promise<string> {
  const meta = writing.getRepository(MetaRow);
  const known = await meta.findOneBy({ key: 'epoch' });
  if (known) return known.value;
  const made = uuid();
  await meta.insert({ key: 'epoch', value: made });
  return made;
}

function causeOf(error: unknown): unknown {
  return error instanceof Error && 'driverError' in error ? error.driverError : error;
}
