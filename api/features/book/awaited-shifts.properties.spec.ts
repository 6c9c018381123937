import type { EntityManager } from 'typeorm';
import type { Entry } from '../../../shared/entries/entry.js';
import { Dice, randomHistory } from '../../testing/random-history.js';
import { setUpDesk } from '../../testing/set-up-desk.js';
import { insertTestGrants } from '../../testing/test-entries.js';
import { TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';
import { ingestEntries } from './ingest.js';
import { rebuildBook } from './rebuild.js';

const DAYS = [
  { shedId: 'north', date: '2026-03-09', patternId: 'north-early' },
  { shedId: 'north', date: '2026-03-09', patternId: 'north-late' },
  { shedId: 'north', date: '2026-03-09', patternId: 'north-night' },
  { shedId: 'north', date: '2026-03-10', patternId: 'north-early' },
] as const;
const OFF = { kind: 'off', startsLocal: null, endsLocal: null, reason: 'Fair' } as const;
const READ_MODELS = [
  `SELECT * FROM "stand" ORDER BY "stopId", "loomId"`,
  `SELECT * FROM "fitting" ORDER BY "id"`,
  `SELECT * FROM "loom_line" ORDER BY "shiftKey", "loomId"`,
];

describe('shifts taken out of the plan and put back among entries', () => {
  const servers: TestServer[] = [];
  afterEach(async () => {
    for (const server of servers.splice(0)) await server.close();
  });
  const newServer = async () => {
    const server = await testServer();
    servers.push(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
    return server;
  };
  const push = async (server: TestServer, entries: readonly Entry[]) => {
    const context = { deviceId: null, deviceRevoked: false, tabletShedId: 'north' };
    const { results } = await server.deps.writer.write((tx) =>
      ingestEntries(tx, entries, { ...context, sentAt: TEST_NOW, serverNow: TEST_NOW }),
    );
    return results;
  };
  const dump = (server: TestServer) =>
    server.deps.writer.write(async (tx: EntityManager) => {
      const tables: unknown[] = [];
      for (const sql of READ_MODELS) tables.push(await tx.query(sql));
      return tables;
    });

  it.each([1, 2, 3, 4])(
    'give in the end the bytes of a book whose shifts were always there (history %i)',
    async (seed) => {
      const dice = new Dice(seed);
      const waiting = dice.stirred(randomHistory(dice, 150, { decisions: false }), 40);
      const always = await newServer();
      await push(always, waiting);

      const server = await newServer();
      const desk = await setUpDesk(server);
      for (const day of DAYS) await desk.change('post', '/calendar', { ...day, ...OFF });
      const out = dice.shuffled(DAYS);
      let waited = 0;
      while (waiting.length > 0) {
        const results = await push(server, waiting.splice(0, 1 + dice.upTo(20)));
        expect(results.filter((one) => one.result === 'refused')).toEqual([]);
        waited += results.filter((one) => one.hold === 'no-shift').length;
        const day = dice.next() < 0.2 ? out.pop() : undefined;
        if (!day) continue;
        await desk.change('post', '/calendar/drop', day);
        expect(await server.deps.writer.write(rebuildBook)).toMatchObject({ different: [] });
      }
      for (const day of out) await desk.change('post', '/calendar/drop', day);

      expect(waited).toBeGreaterThan(0);
      const left = await server.deps.reads.query(
        `SELECT * FROM "entry_hold" WHERE "reason" = 'no-shift' AND "state" = 'held'`,
      );
      expect(left).toEqual([]);
      expect(await dump(server)).toEqual(await dump(always));
      expect(await server.deps.writer.write(rebuildBook)).toMatchObject({ different: [] });
    },
  );
});
