import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import type { PushRequest, PushResponse } from '@shared/contract/sync';
import { entrySchema } from '@shared/entries/entry';
import { upgradeEntry } from '@shared/entries/upgrades';
import { bookFile } from '../../api/database/prepare-database.js';
import { rebuildBook } from '../../api/features/book/rebuild.js';
import { insertTestGrants } from '../../api/testing/test-entries.js';
import { testServer, type TestServer } from '../../api/testing/test-server.js';

/**
 * What was sent and kept on the day in each file's name. Every later version must still take it: mend the program,
 * never the file.
 */
const FROZEN = new URL('../frozen/', import.meta.url);
const named = (end: RegExp) => readdirSync(FROZEN).filter((name) => end.test(name));
/** How many kinds there were, by the schema version of then. */
const KINDS: Readonly<Record<string, number>> = { v1: 20, v2: 22 };
const read = (name: string) => readFileSync(new URL(name, FROZEN), 'utf8');

const servers: TestServer[] = [];
const folders: string[] = [];
afterEach(async () => {
  for (const server of servers.splice(0)) await server.close();
  for (const folder of folders.splice(0)) rmSync(folder, { recursive: true, force: true });
});

async function push(server: TestServer, request: PushRequest): Promise<PushResponse> {
  const tablet = await server.tablet();
  const response = await server.call('post', '/sync/entries', { as: tablet, body: request });
  expect(response.status).toBe(200);
  return response.body as PushResponse;
}

describe.each(named(/-push-request-v\d+\.json$/))('a push of a tablet of then: %s', (name) => {
  const request = JSON.parse(read(name)) as PushRequest;

  it('is taken whole, entry by entry', async () => {
    const server = await testServer();
    servers.push(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
    const { results } = await push(server, request);
    expect(results.map(({ result, code }) => code ?? result)).not.toContain('refused');
    const taken = results.filter(({ result }) => result === 'stored' || result === 'held');
    expect(taken).toHaveLength(request.entries.length);
    const again = await push(server, request);
    expect(new Set(again.results.map(({ result }) => result))).toEqual(new Set(['duplicate']));
  });

  it('holds an entry of each kind of then', () => {
    const kinds = new Set(request.entries.map((entry) => entry['kind']));
    expect(kinds.size).toBe(KINDS[/v\d+(?=\.json$)/.exec(name)?.[0] ?? '']);
    for (const entry of request.entries) {
      const upgraded = upgradeEntry(entry);
      expect(upgraded.is).toBe('current');
      if (upgraded.is === 'current') entrySchema.parse(upgraded.entry);
    }
  });
});

describe.each(named(/-book\.sql$/))('a book of then: %s', (name) => {
  /** The file as the server of then left it. */
  function bookOfThen(): { dataDir: string; entries: number } {
    const dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-frozen-'));
    folders.push(dataDir);
    const database = new Database(bookFile(dataDir));
    database.exec(read(name));
    const entries = database.prepare('SELECT count(*) FROM "entry"').pluck().get() as number;
    database.close();
    return { dataDir, entries };
  }

  it('is brought up to date: every entry is there and reads, every line can be made', async () => {
    const { dataDir, entries } = bookOfThen();
    const server = await testServer({ empty: true, settings: { dataDir } });
    servers.push(server);
    const rows = await server.deps.reads.query<{ body: string }[]>('SELECT "body" FROM "entry"');
    expect(rows).toHaveLength(entries);
    for (const { body } of rows) {
      const upgraded = upgradeEntry(JSON.parse(body) as Record<string, unknown>);
      expect(upgraded.is === 'current' && entrySchema.safeParse(upgraded.entry).success).toBe(true);
    }
    const rebuilt = await server.deps.writer.write(rebuildBook);
    // What the server of then had made of the entries and what its foremen had signed, today's makes to the byte.
    expect(rebuilt).toMatchObject({ different: [], unlikeSigned: [] });
    expect(rebuilt.lines).toBeGreaterThan(0);
  });

  it('takes what it has already as duplicates, and answers a pull', async () => {
    const { dataDir } = bookOfThen();
    const server = await testServer({ empty: true, settings: { dataDir } });
    servers.push(server);
    const request = JSON.parse(read(name.replace('-book.sql', '-push-request-v1.json'))) as PushRequest;
    const { results } = await push(server, request);
    expect(new Set(results.map(({ result }) => result))).toEqual(new Set(['duplicate']));
    const pull = await server.call('get', '/sync/changes', { as: await server.tablet() });
    expect(pull.status).toBe(200);
    expect(pull.body.entries.length).toBeGreaterThan(0);
  });
});

describe('a tablet of a newer application', () => {
  it('is told `later` for what this server cannot read yet; its other entries are taken', async () => {
    const [name = ''] = named(/-push-request-v1\.json$/);
    const request = JSON.parse(read(name)) as PushRequest;
    const newer = { ...request.entries[1], schema: 99, somethingNew: true };
    const server = await testServer();
    servers.push(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
    const { results } = await push(server, { ...request, entries: [newer, request.entries[3] ?? {}] });
    expect(results.map(({ result }) => result)).toEqual(['later', 'stored']);
  });
});
