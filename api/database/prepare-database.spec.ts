import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { CannotStart } from '../cannot-start.js';
import { lockDataFolder, whyNoDatabase } from './data-folder-lock.js';
import { bookFile, prepareDatabase, prepareDataFolder } from './prepare-database.js';

describe('preparing the book', () => {
  let dataDir: string;
  beforeEach(() => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-test-'));
  });
  afterEach(() => rmSync(dataDir, { recursive: true, force: true }));

  it('keeps what it acknowledges: WAL, synchronous FULL, foreign keys', async () => {
    const { writing, close } = await prepareDatabase(dataDir);
    expect(await writing.query('PRAGMA journal_mode')).toEqual([{ journal_mode: 'wal' }]);
    expect(await writing.query('PRAGMA synchronous')).toEqual([{ synchronous: 2 }]);
    expect(await writing.query('PRAGMA foreign_keys')).toEqual([{ foreign_keys: 1 }]);
    await close();
  });

  it('gives the book its epoch once', async () => {
    const first = await prepareDatabase(dataDir);
    await first.close();
    const second = await prepareDatabase(dataDir);
    await second.close();
    expect(first.epoch).toMatch(/^[0-9a-f-]{36}$/);
    expect(second.epoch).toBe(first.epoch);
    rmSync(bookFile(dataDir));
    const another = await prepareDatabase(dataDir);
    await another.close();
    expect(another.epoch).not.toBe(first.epoch);
  });

  it('reads on a connection that cannot write, and sees what is committed', async () => {
    const { writing, reads, close } = await prepareDatabase(dataDir);
    await writing.query(`INSERT INTO "shed" VALUES ('north', 'North')`);
    expect(await reads.query('SELECT "id" FROM "shed"')).toEqual([{ id: 'north' }]);
    await expect(reads.query(`INSERT INTO "shed" VALUES ('south', 'South')`)).rejects.toThrow(/readonly/);
    await close();
  });

  it('refuses a book whose rows point at nothing', async () => {
    const { writing, close } = await prepareDatabase(dataDir);
    await writing.query('PRAGMA foreign_keys = OFF');
    await writing.query(
      `INSERT INTO "loom" VALUES ('n1', 'no-such-shed', 1, 1, 1, 'A', 1767225600000, NULL)`,
    );
    await close();
    await expect(prepareDatabase(dataDir)).rejects.toThrow(/1 rows that point at nothing/);
  });

  it('refuses a file that is no book, and leaves it as it is', async () => {
    writeFileSync(bookFile(dataDir), 'not a database, but somebody’s letter'.repeat(100));
    const before = readFileSync(bookFile(dataDir));
    await expect(prepareDatabase(dataDir)).rejects.toThrow(CannotStart);
    await expect(prepareDatabase(dataDir)).rejects.toThrow(/not a sound SQLite file/);
    expect(readFileSync(bookFile(dataDir)).equals(before)).toBe(true);
  });

  it('says so where a folder cannot be made', () => {
    writeFileSync(join(dataDir, 'file'), '');
    expect(() => prepareDataFolder(join(dataDir, 'file', 'data'))).toThrow(CannotStart);
    expect(() => prepareDataFolder(join(dataDir, 'file', 'data'))).toThrow(/cannot be written.*DATA_DIR/);
  });

  it('says what to do where the driver is not built', () => {
    const error = new Error('Could not locate the bindings file. Tried: …');
    expect(String(whyNoDatabase(error, 'book.sqlite'))).toMatch(/npm rebuild better-sqlite3.*C\+\+ compiler/);
    const other = new Error('something else');
    expect(whyNoDatabase(other, 'book.sqlite')).toBe(other);
  });
});

describe('the data folder’s lock', () => {
  let dataDir: string;
  beforeEach(() => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-test-'));
  });
  afterEach(() => rmSync(dataDir, { recursive: true, force: true }));

  it('is held by one, and says by whom', () => {
    const lock = lockDataFolder(dataDir);
    expect(() => lockDataFolder(dataDir)).toThrow(CannotStart);
    expect(() => lockDataFolder(dataDir)).toThrow(`process ${process.pid}`);
    lock.release();
    lock.release();
    lockDataFolder(dataDir).release();
  });

  it('does not outlive its holder: a file left behind by a crash holds nothing', () => {
    const crashed = lockDataFolder(dataDir);
    const left = readFileSync(join(dataDir, 'in-use.txt'));
    crashed.release();
    writeFileSync(join(dataDir, 'in-use.txt'), left);
    new Database(join(dataDir, 'in-use.lock')).close();
    lockDataFolder(dataDir).release();
  });
});
