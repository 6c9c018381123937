import Database from 'better-sqlite3';

/** What a book holds, counted where it was opened. */
export interface BookCounts {
  readonly entries: number;
  readonly changes: number;
  readonly lines: number;
}

/** A file that is no sound book; the message says what is wrong with it. */
export class UnsoundBook extends Error {}

/**
 * Opens a book's file and sees that it is one: every page sound, every row pointing at something, its tables there.
 * Throws `UnsoundBook`.
 */
export function verifyBook(file: string): BookCounts {
  let database: Database.Database;
  try {
    database = new Database(file, { fileMustExist: true });
  } catch (error) {
    throw new UnsoundBook(`${file} cannot be opened (${messageOf(error)}).`);
  }
  try {
    // One file, whatever it was copied from: no write-ahead log beside it is waited for.
    database.pragma('journal_mode = DELETE');
    const said = database.pragma('integrity_check', { simple: true });
    if (said !== 'ok') throw new UnsoundBook(`${file} is damaged: ${String(said)}.`);
    const broken = database.pragma('foreign_key_check');
    if (Array.isArray(broken) && broken.length > 0)
      throw new UnsoundBook(`${file} has ${broken.length} rows that point at nothing.`);
    return countsOf(database);
  } catch (error) {
    if (error instanceof UnsoundBook) throw error;
    throw new UnsoundBook(`${file} is not a book of Shedbeat (${messageOf(error)}).`);
  } finally {
    database.close();
  }
}

export function countsOf(database: Database.Database): BookCounts {
  const count = (table: 'entry' | 'change' | 'loom_line') =>
    database.prepare(`SELECT count(*) FROM "${table}"`).pluck().get() as number;
  return { entries: count('entry'), changes: count('change'), lines: count('loom_line') };
}

export function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
