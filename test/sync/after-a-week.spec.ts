import 'fake-indexeddb/auto';
import { rmSync } from 'node:fs';
import { LIMITS } from '@shared/contract/limits';
import { ensureShifts } from '../../api/features/book/shifts.js';
import { TEST_PEOPLE } from '../../api/testing/test-server.js';
import { FaultServer } from './faults/fault-server';
import { FaultTablet } from './faults/fault-tablet';
import type { WireFault } from './faults/plan';
import { NO_SABOTAGE } from './faults/sabotage';
import { tabletId, templateMill } from './faults/template-mill';

const WEEK = 7 * 86_400_000;
const TAPS = 20_000;
const LOOMS = ['n1', 'n2', 'n3', 'n4'];
/** While the queue is sent. */
const FAULTS = Array.from({ length: 60 }, (_, n): WireFault | null =>
  n % 10 === 3 ? 'answer lost' : n % 10 === 8 ? '503' : n === 15 ? '413' : null,
);

describe('a tablet that comes back after a week without network', () => {
  let template: string;
  beforeAll(async () => {
    template = await templateMill();
  });
  afterAll(() => rmSync(template, { recursive: true, force: true }));

  it(`brings ${TAPS} taps into the book once each, in their order, a batch at a time`, async () => {
    const server = await FaultServer.start(template);
    try {
      // As the server's shift maker does.
      const { now } = server.clock;
      await server.deps.writer.write((tx) => ensureShifts(tx, now, now + 2 * WEEK));
      const tablet = new FaultTablet({
        id: tabletId(0),
        faults: FAULTS,
        url: () => server.url,
        now: () => server.clock.now,
        clockError: 0,
        sabotage: NO_SABOTAGE,
      });
      for (let n = 0; n < TAPS; n++) {
        await tablet.log(TEST_PEOPLE.weaver.id, {
          kind: 'stop',
          loomId: LOOMS[n % LOOMS.length] ?? 'n1',
          cause: 'warp-break',
          count: 1,
        });
        server.clock.now += WEEK / TAPS;
      }
      expect(tablet.shown).toHaveLength(TAPS);

      let tries = 0;
      while (!(await tablet.exchange())) if (++tries > 40) throw new Error('It is stuck.');
      const rows = await server.deps.reads.query<{ id: string; deviceSeq: number }[]>(
        `SELECT "id", "deviceSeq" FROM "entry" ORDER BY "seq"`,
      );
      expect(rows.map(({ id }) => id)).toEqual(tablet.shown.map(({ id }) => id));
      expect(rows.map(({ deviceSeq }) => deviceSeq)).toEqual(Array.from({ length: TAPS }, (_, n) => n + 1));
      expect(await tablet.waiting()).toBe(0);
      // Neither end ever had more than a batch in hand, and what was harmed was sent again alone.
      expect(tablet.wire.largest).toBeLessThan(LIMITS.bodyBytes / 4);
      expect(tablet.wire.requests).toBeLessThan(
        1.6 * (TAPS / LIMITS.entriesPerPush) + TAPS / LIMITS.changesPerPull,
      );
      expect(tablet.wire.struck).toHaveLength(FAULTS.filter((fault) => fault !== null).length);
      const [counted] = await server.deps.reads.query<{ stops: number }[]>(
        `SELECT sum(json_array_length("line", '$.stops')) AS "stops" FROM "loom_line"`,
      );
      expect(counted?.stops).toBe(TAPS);
    } finally {
      await server.close();
    }
  }, 300_000);
});
