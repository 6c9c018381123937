import { entry, HOUR, insertTestGrants, TUESDAY } from '../../testing/test-entries.js';
import { setUpDesk } from '../../testing/set-up-desk.js';
import { TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';

describe('a mill of 500 looms', () => {
  let server: TestServer;
  beforeEach(async () => {
    server = await testServer();
  });
  afterEach(() => server.close());

  it('is set up at once, read whole and changed while a shift runs', async () => {
    const desk = await setUpDesk(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
    const places = Array.from({ length: 500 }, (_, i) => ({
      number: 101 + i,
      row: 11 + Math.floor(i / 25),
      position: 1 + (i % 25),
      alley: `Alley ${Math.floor(i / 50) + 1}`,
    }));
    const facts = {
      ppm: 200,
      reedSpaceCm: 190,
      clock: { kind: 'continuous', unit: 100, digits: 5 },
      shuttles: 1,
      battery: false,
    };
    const loomIds = await desk.change('post', '/looms', {
      shedId: 'north',
      from: TEST_NOW - HOUR,
      places,
      facts,
    });
    expect(loomIds).toHaveLength(500);

    const body = {
      sentAt: TEST_NOW,
      entries: [entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at: TEST_NOW })],
    };
    await server.call('post', '/sync/entries', { as: await server.tablet(), body });
    await desk.change('post', '/looms/versions', {
      loomIds,
      effectiveAt: TEST_NOW - HOUR,
      facts: { ppm: 210 },
    });
    const lines = await server.deps.reads.query<{ n: number; most: number }[]>(
      `SELECT COUNT(*) AS "n", MAX("possiblePicks") AS "most" FROM "loom_line" WHERE "shiftKey" = ?`,
      [TUESDAY],
    );
    expect(lines).toEqual([{ n: 504, most: 200 * 150 + 210 * 330 }]);

    const read = await server.call('get', '/set-up', { as: desk.actor });
    // Measured: 320 kB. One answer serves every room of set-up.
    expect(Buffer.byteLength(read.text)).toBeLessThan(400_000);
    expect(read.body.loomVersions).toHaveLength(2 * 500 + 6);
  });
});
