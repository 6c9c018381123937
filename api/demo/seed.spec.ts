import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { rebuildBook } from '../features/book/rebuild.js';
import { createPasswords } from '../features/sessions/worker-passwords.js';
import { openDeps } from '../open-deps.js';
import { TEST_SETTINGS } from '../testing/test-server.js';
import { seedDemo } from './seed.js';
import { makeRoom } from './make-room.js';

/** Saturday afternoon: the demo must have a shift in progress even then. */
const SATURDAY = Date.parse('2026-11-28T15:40:00Z');

describe('the demo’s seeder', () => {
  let dataDir: string;
  beforeAll(() => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-demo-'));
  });
  afterAll(() => rmSync(dataDir, { recursive: true, force: true }));

  const open = () =>
    openDeps({ ...TEST_SETTINGS, dataDir }, { now: () => SATURDAY, passwords: createPasswords(4) });

  it('sends three weeks through the ingest: entries, lines, a shift in progress, one entry held', async () => {
    const opened = await open();
    const seeded = await seedDemo(opened.deps, () => undefined, { weeks: 3 });
    expect(seeded.made && seeded.held).toBe(2);
    const count = async (sql: string): Promise<number> => {
      const [row] = await opened.deps.reads.query<{ n: number }[]>(sql);
      return row?.n ?? -1;
    };
    expect(await count(`SELECT count(*) AS n FROM entry`)).toBe(seeded.made ? seeded.entries : -1);
    expect(await count(`SELECT count(*) AS n FROM entry_hold WHERE state = 'held'`)).toBe(1);
    const current = `"startsAt" <= ${SATURDAY} AND "endsAt" > ${SATURDAY}`;
    expect(await count(`SELECT count(*) AS n FROM shift WHERE ${current}`)).toBe(1);
    expect(
      await count(
        `SELECT count(*) AS n FROM loom_line WHERE "shiftKey" IN (SELECT "key" FROM shift WHERE ${current})`,
      ),
    ).toBe(24);
    expect(await count(`SELECT count(*) AS n FROM shift WHERE state = 'closed'`)).toBe(
      (await count(`SELECT count(*) AS n FROM shift WHERE "endsAt" <= ${SATURDAY}`)) - 1,
    );
    const [sums] = await opened.deps.reads.query<{ efficiency: number; over: number }[]>(
      `SELECT sum("picks") / sum("possiblePicks") AS efficiency, max("picks" / "possiblePicks") AS over
       FROM loom_line WHERE "picks" IS NOT NULL`,
    );
    expect(sums?.efficiency).toBeGreaterThan(0.75);
    expect(sums?.efficiency).toBeLessThan(0.92);
    expect(sums?.over).toBeLessThan(1);
    const rebuilt = await opened.deps.writer.write((tx) => rebuildBook(tx));
    expect(rebuilt.lines).toBeGreaterThan(1_000);
    expect(rebuilt.different).toEqual([]);
    expect(rebuilt.unlikeSigned).toEqual([]);
    await opened.close();
  }, 120_000);

  it('is harmless when run again, and keeps its hands off a mill that is not the demo', async () => {
    makeRoom(dataDir, { fresh: false });
    const opened = await open();
    expect(await seedDemo(opened.deps, () => undefined)).toEqual({ made: false, seededAt: SATURDAY });
    await opened.deps.writer.write((tx) => tx.query(`DELETE FROM meta WHERE "key" LIKE 'demo-%'`));
    await opened.close();
    expect(() => makeRoom(dataDir, { fresh: true })).toThrow('holds a mill that is not the demo');
  });
});
