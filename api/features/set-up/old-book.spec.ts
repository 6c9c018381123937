import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';
import { bookFile } from '../../database/prepare-database.js';
import { readSetUp } from './read-set-up.js';

const FROZEN = new URL('../../../test/frozen/', import.meta.url);
const books = readdirSync(FROZEN).filter((name) => name.endsWith('-book.sql'));

describe.each(books)('a book from before set-up: %s', (name) => {
  let server: TestServer;
  let dataDir: string;
  let looms: unknown[];
  beforeEach(async () => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-old-'));
    const database = new Database(bookFile(dataDir));
    database.exec(readFileSync(new URL(name, FROZEN), 'utf8'));
    looms = database.prepare('SELECT * FROM "loom" ORDER BY "number", "id"').all();
    database.close();
    server = await testServer({ empty: true, settings: { dataDir } });
  });
  afterEach(async () => {
    await server.close();
    rmSync(dataDir, { recursive: true, force: true });
  });

  it('has all that it had, and what is new says nothing yet', async () => {
    const mill = await readSetUp(server.deps.reads.manager, TEST_NOW);
    expect(mill.mill).toMatchObject({
      timeZone: 'Europe/London',
      figuresByPerson: 'own',
      lockAfterMinutes: 5,
    });
    expect(mill.looms).toEqual(looms);
    expect(mill.alleys.every(({ tacklerIds }) => tacklerIds.length === 0)).toBe(true);
    expect(mill.cloths.every(({ retired }) => retired === false)).toBe(true);
    expect(mill.patterns.length).toBeGreaterThan(0);
    expect(mill.patterns.every(({ from, until }) => from === null && until === null)).toBe(true);
    expect([mill.targets, mill.parts, mill.jobs]).toEqual([[], [], []]);
  });

  it('tells its tablets that there is more to know', async () => {
    const [last] = await server.deps.reads.query(`SELECT * FROM "change" ORDER BY "seq" DESC LIMIT 1`);
    expect(last).toMatchObject({ shedId: null, kind: 'reference', mark: expect.stringMatching(/./) });
  });
});
