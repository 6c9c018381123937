import {
  copyFileSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  rmSync,
  truncateSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { bookFile } from '../database/prepare-database.js';
import { writePhoto } from '../files/photo-files.js';
import { openDeps } from '../open-deps.js';
import { entry } from '../testing/test-entries.js';
import { TEST_NOW, TEST_SETTINGS, testServer, type TestServer } from '../testing/test-server.js';
import { backupFolder, copiedPhotosFolder, listBackups } from './backup-files.js';
import { ANSWERED, ASKED, isDue, startBackups } from './backup-hours.js';
import { restoreBook } from './restore-book.js';
import { takeBackup } from './take-backup.js';
import { UnsoundBook, verifyBook } from './verify-book.js';

const HOUR = 3_600_000;

describe('backups', () => {
  let server: TestServer;
  let dataDir: string;
  beforeEach(async () => {
    server = await testServer();
    ({ dataDir } = server.deps.settings);
  });
  afterEach(() => server.close());

  const log = async (count: number) => {
    const actor = await server.signInOnTablet('weaver');
    const grantId = actor.session.grant?.id ?? '';
    const entries = Array.from({ length: count }, () =>
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at: TEST_NOW, grantId }),
    );
    return server.call('post', '/sync/entries', { as: actor, body: { sentAt: server.clock.now, entries } });
  };

  it('hold what the book holds, in one sound file', async () => {
    await log(5);
    const taken = await takeBackup(server.deps);
    expect(taken).toMatchObject({
      entries: 5,
      file: join(dataDir, 'backups', 'book-20260310-093000.sqlite'),
    });
    expect(readdirSync(backupFolder(dataDir))).toEqual(['book-20260310-093000.sqlite']);
    expect(verifyBook(taken.file)).toMatchObject({ entries: 5 });
  });

  it('are taken while taps come: none waits for ever, none is lost', async () => {
    const actor = await server.signInOnTablet('weaver');
    const grantId = actor.session.grant?.id ?? '';
    let done = false;
    const taking = takeBackup(server.deps).finally(() => (done = true));
    let pushed = 0;
    do {
      const entries = [entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at: TEST_NOW, grantId })];
      const { body } = await server.call('post', '/sync/entries', {
        as: actor,
        body: { sentAt: server.clock.now, entries },
      });
      expect(body.results[0].result).toBe('stored');
      pushed++;
    } while (!done);
    await taking;
    const [row] = await server.deps.reads.query('SELECT count(*) AS "n" FROM "entry"');
    expect(row.n).toBe(pushed);
  });

  it('share copies of the photos, each made once', async () => {
    const first = await writePhoto(dataDir, Buffer.from('a picture'));
    await takeBackup(server.deps);
    const second = await writePhoto(dataDir, Buffer.from('another'));
    server.clock.pass(HOUR);
    await takeBackup(server.deps);
    expect(readdirSync(copiedPhotosFolder(dataDir)).sort()).toEqual([first, second].sort());
    expect(listBackups(dataDir)).toHaveLength(2);
  });

  it('are kept by number, the newest ones', async () => {
    for (let n = 0; n < 5; n++) {
      await takeBackup(server.deps);
      server.clock.pass(HOUR);
    }
    expect(listBackups(dataDir).map(({ at }) => (at - TEST_NOW) / HOUR)).toEqual([2, 3, 4]);
  });

  it('leave no half of one behind, and the older ones alone', async () => {
    await takeBackup(server.deps);
    server.clock.pass(HOUR);
    const writer = Object.create(server.deps.writer, {
      exclusive: { value: () => Promise.reject(new Error('disk I/O error')) },
    }) as typeof server.deps.writer;
    await expect(takeBackup({ ...server.deps, writer })).rejects.toThrow('disk I/O error');
    expect(readdirSync(backupFolder(dataDir))).toEqual(['book-20260310-093000.sqlite']);
  });

  it('are due once a day at the hour, and after it where the server was off then', async () => {
    const at = (hour: number) => {
      const day = new Date(TEST_NOW);
      day.setHours(hour, 30, 0, 0);
      server.clock.now = day.getTime();
      return isDue({ settings: { ...server.deps.settings, backupHour: 2 }, now: () => server.clock.now });
    };
    expect(at(1)).toBe(true);
    await takeBackup(server.deps);
    expect(at(1)).toBe(false);
    expect(at(2)).toBe(true);
    await takeBackup(server.deps);
    expect([at(2), at(23)]).toEqual([false, false]);
    expect(isDue(server.deps)).toBe(false);
  });

  it('are taken for a command that asks by a file', async () => {
    const stop = startBackups(server.deps);
    try {
      const asked = join(backupFolder(dataDir), `7${ASKED}`);
      writeFileSync(asked, '');
      await vi.waitFor(() => expect(existsSync(asked.replace(ASKED, ANSWERED))).toBe(true), 10_000);
      expect(listBackups(dataDir)).toHaveLength(1);
      expect(existsSync(asked)).toBe(false);
    } finally {
      stop();
    }
  });

  it('that are damaged, or no books, are not taken for sound', async () => {
    const { file } = await takeBackup(server.deps);
    truncateSync(file, 40_000);
    expect(() => verifyBook(file)).toThrow(UnsoundBook);
    const other = join(dataDir, 'other.sqlite');
    new Database(other).close();
    expect(() => verifyBook(other)).toThrow(UnsoundBook);
  });
});

describe('a restore', () => {
  let dataDir: string;
  let backup: string;
  let epoch: string;
  beforeAll(async () => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-restore-'));
    const server = await testServer();
    const taken = await takeBackup(server.deps);
    epoch = server.deps.epoch;
    backup = join(dataDir, 'a-backup.sqlite');
    copyFileSync(taken.file, backup);
    await server.close();
  });
  afterAll(() => rmSync(dataDir, { recursive: true, force: true }));

  const open = () => openDeps({ ...TEST_SETTINGS, dataDir });

  it('makes the book anew under another epoch', async () => {
    expect(restoreBook(dataDir, backup, TEST_NOW)).toMatchObject({ replaced: null });
    const opened = await open();
    expect(opened.deps.epoch).not.toBe(epoch);
    await opened.close();
  });

  it('refuses while a server runs; nothing is changed', async () => {
    const opened = await open();
    expect(() => restoreBook(dataDir, backup, TEST_NOW)).toThrow(/is in use by .* nothing was changed/s);
    await opened.close();
    const again = await open();
    expect(again.deps.epoch).toBe(opened.deps.epoch);
    await again.close();
  });

  it('puts back the photos that lie beside the backup and are gone here', () => {
    const beside = join(dataDir, 'brought');
    const name = '0195e000-0000-4000-8000-000000000001.jpg';
    mkdirSync(join(beside, 'photos'), { recursive: true });
    copyFileSync(backup, join(beside, 'book.sqlite'));
    writeFileSync(join(beside, 'photos', name), 'a picture');
    writeFileSync(join(beside, 'photos', 'no-photo.sh'), 'not ours');
    restoreBook(dataDir, join(beside, 'book.sqlite'), TEST_NOW);
    expect(readdirSync(join(dataDir, 'photos'))).toEqual([name]);
  });

  it('keeps what was in its place', async () => {
    const before = await open();
    await before.close();
    const { replaced } = restoreBook(dataDir, backup, TEST_NOW);
    expect(replaced).toBe(join(dataDir, 'replaced-20260310-093000', 'book.sqlite'));
    const kept = new Database(replaced ?? '', { readonly: true });
    const value = kept.prepare(`SELECT "value" FROM "meta" WHERE "key" = 'epoch'`).pluck().get();
    kept.close();
    expect(value).toBe(before.deps.epoch);
  });

  it('refuses what is no sound book, what is not there, and what a newer program made', () => {
    const bad = join(dataDir, 'bad.sqlite');
    writeFileSync(bad, 'not a database at all, whatever its name says');
    expect(() => restoreBook(dataDir, bad, TEST_NOW)).toThrow(/Nothing was changed/);
    expect(() => restoreBook(dataDir, join(dataDir, 'none'), TEST_NOW)).toThrow(/There is no file/);
    const newer = join(dataDir, 'newer.sqlite');
    copyFileSync(backup, newer);
    const database = new Database(newer);
    database.exec(`INSERT INTO "migrations" ("timestamp", "name") VALUES (9e12, 'Tomorrow9000000000000')`);
    database.close();
    expect(() => restoreBook(dataDir, newer, TEST_NOW)).toThrow(/newer version/);
    expect(existsSync(bookFile(dataDir))).toBe(true);
  });
});
