import 'fake-indexeddb/auto';
import { cpSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { ENTRY_SCHEMA_VERSION } from '@shared/entries/entry';
import type { LoomLine } from '@shared/entries/loom-line';
import type { EntryDraft } from '../../src/app/offline/entry-draft';
import { TEST_NOW, testShiftKey } from '../../api/testing/test-server.js';
import { faultyWire, seeded, type Fault } from './faulty-wire';
import { servedMill, type ServedMill } from './served-mill';
import { SimulatedTablet } from './simulated-tablet';

const MINUTE = 60_000;
const LOOMS = ['n1', 'n2', 'n3', 'n4'];

const tap = (n: number): EntryDraft => ({
  kind: 'stop',
  loomId: LOOMS[n % LOOMS.length] ?? 'n1',
  cause: n % 3 === 0 ? 'weft-break' : 'warp-break',
  count: 1,
});

async function signedIn(mill: ServedMill, fault: () => Fault, clockError = 0) {
  const actor = await mill.server.signInOnTablet('weaver');
  const grant = actor.session.grant;
  if (!grant) throw new Error('No grant.');
  const wire = faultyWire(fault);
  const where = { url: mill.url };
  const tablet = new SimulatedTablet({
    grant,
    shedId: 'north',
    authorization: actor.authorization,
    fetch: wire.fetch,
    url: () => where.url,
    now: TEST_NOW + clockError,
    random: seeded(7),
  });
  return { tablet, wire, where };
}

async function bookOf(mill: ServedMill) {
  const rows = await mill.server.deps.reads.query<{ id: string; deviceSeq: number; at: number }[]>(
    `SELECT "id", "deviceSeq", "at" FROM "entry" ORDER BY "deviceSeq"`,
  );
  return rows.map((row) => ({ ...row }));
}

async function lineOf(mill: ServedMill, loomId: string): Promise<LoomLine> {
  const [row] = await mill.server.deps.reads.query<{ line: string }[]>(
    `SELECT "line" FROM "loom_line" WHERE "shiftKey" = ? AND "loomId" = ?`,
    [testShiftKey(), loomId],
  );
  if (!row) throw new Error(`No line of ${loomId}.`);
  return JSON.parse(row.line) as LoomLine;
}

describe('a tablet on a bad wire', () => {
  const mills: ServedMill[] = [];
  const start = async (...options: Parameters<typeof servedMill>) => {
    const mill = await servedMill(...options);
    mills.push(mill);
    return mill;
  };
  afterEach(async () => {
    for (const mill of mills.splice(0)) await mill.close();
  });

  it.each([1, 2, 3])('brings 100 entries into the book exactly once (seed %i)', async (seed) => {
    const mill = await start();
    const random = seeded(seed);
    const fault = (): Fault => {
      const dice = random();
      if (dice < 0.25) return 'answer lost';
      if (dice < 0.4) return 'request lost';
      return dice < 0.45 ? 'portal' : 'none';
    };
    const { tablet, wire } = await signedIn(mill, fault);
    const logged: string[] = [];
    for (let n = 0; n < 100;) {
      for (let i = 0; i < 5; i++, n++)
        logged.push(...(await tablet.log(tap(n))).map(({ entry }) => entry.id));
      await tablet.loop.exchangeOnce();
      tablet.time.advance(MINUTE / 2);
      mill.server.clock.pass(MINUTE / 2);
    }
    await tablet.syncUntilDone();

    expect(wire.seen.get('answer lost')).toBeGreaterThan(3);
    const stored = await bookOf(mill);
    expect(stored.map(({ id }) => id).sort()).toEqual([...logged].sort());
    expect(stored.map(({ deviceSeq }) => deviceSeq)).toEqual(Array.from({ length: 100 }, (_, i) => i + 1));
    expect(await tablet.outbox.all()).toEqual([]);
    // Tablet and server, by the same arithmetic over what each has, to the byte.
    const view = await tablet.view();
    const shift = view.shiftAt('north', TEST_NOW);
    expect(shift?.key).toBe(testShiftKey());
    for (const loomId of LOOMS) {
      const line = await lineOf(mill, loomId);
      expect(line.stops).toHaveLength(25);
      expect(JSON.stringify(shift && view.project(loomId, shift))).toBe(JSON.stringify(line));
    }
  });

  it('corrects a wrong clock once, and shows before what the book will show after', async () => {
    const mill = await start();
    const { tablet } = await signedIn(mill, () => 'none', 7 * MINUTE);
    await tablet.syncUntilDone();
    expect(tablet.time.offset).toBeCloseTo(-7 * MINUTE, -2);
    await tablet.log(tap(1));
    const before = await tablet.view();
    const shift = before.shiftAt('north', TEST_NOW);
    if (!shift) throw new Error('No shift.');
    const provisional = before.project('n2', shift).stops.map((stop) => stop.from);
    await tablet.syncUntilDone();
    const [stored] = await bookOf(mill);
    expect(stored?.at).toBe(TEST_NOW);
    expect(provisional).toEqual([TEST_NOW]);
  });

  it('keeps the server’s word on each entry: stored, held, refused, and `later`', async () => {
    const mill = await start();
    const { tablet } = await signedIn(mill, () => 'none');
    const [stored] = await tablet.log(tap(0));
    const [held] = await tablet.log({ ...tap(1), at: TEST_NOW - 40 * 86_400_000 });
    const [refused] = await tablet.log({ ...tap(2), loomId: 'n99' } as EntryDraft);
    const [later] = await tablet.log(tap(3));
    // As a newer application would have left it before it was set back.
    await tablet.database.transact(['outbox'], 'readwrite', (transaction) => {
      const entry = { ...later!.entry, schema: ENTRY_SCHEMA_VERSION + 1 };
      transaction.objectStore('outbox').put({ ...later!, entry }, entry.id);
    });
    await tablet.syncUntilDone();
    const records = new Map((await tablet.outbox.all()).map((record) => [record.entry.id, record]));
    expect(records.has(stored!.entry.id)).toBe(false);
    expect(records.get(held!.entry.id)).toMatchObject({ state: 'held', hold: expect.any(String) });
    expect(records.get(refused!.entry.id)).toMatchObject({ state: 'refused', code: 'loom-unknown' });
    expect(records.get(later!.entry.id)).toMatchObject({ state: 'later' });
    const view = await tablet.view();
    const shift = view.shiftAt('north', TEST_NOW);
    expect(shift && view.project('n1', shift).stops.map((stop) => stop.id)).toEqual([stored!.entry.id]);
  });

  it('gives a restored server back what its backup lacks, once', async () => {
    const backup = mkdtempSync(join(tmpdir(), 'shedbeat-backup-'));
    try {
      const mill = await start();
      const { tablet, where } = await signedIn(mill, () => 'none');
      for (let n = 0; n < 10; n++) await tablet.log(tap(n));
      await tablet.syncUntilDone();
      // Nothing writes meanwhile, so that the files (with the write-ahead log) are a whole book.
      cpSync(mill.server.deps.settings.dataDir, backup, { recursive: true });
      for (let n = 10; n < 20; n++) await tablet.log(tap(n));
      await tablet.syncUntilDone();
      expect(await bookOf(mill)).toHaveLength(20);

      const restored = await start({ empty: true, settings: { dataDir: backup } });
      where.url = restored.url;
      expect(await bookOf(restored)).toHaveLength(10);
      await tablet.syncUntilDone();
      const stored = await bookOf(restored);
      expect(stored.map(({ deviceSeq }) => deviceSeq)).toEqual(Array.from({ length: 20 }, (_, i) => i + 1));
      expect(await tablet.outbox.all()).toEqual([]);
    } finally {
      rmSync(backup, { recursive: true, force: true });
    }
  });
});
