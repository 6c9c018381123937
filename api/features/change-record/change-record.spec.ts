import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';

describe('the record of changes', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
  });
  afterEach(() => server.close());

  const faster = (ppm: number) =>
    desk.change('post', '/looms/versions', { loomIds: ['n1'], effectiveAt: TEST_NOW, facts: { ppm } });

  it('says who changed what, when, from what to what', async () => {
    await faster(210);
    expect(await desk.record()).toEqual([
      {
        seq: 1,
        at: TEST_NOW,
        by: 'maud',
        byName: 'Maud Test',
        what: 'loom',
        name: 'Loom 1',
        action: 'changed',
        effectiveAt: TEST_NOW,
        before: { ppm: 200 },
        after: { ppm: 210 },
        reason: null,
      },
    ]);
  });

  it('is searched by any of it, and comes in pages', async () => {
    for (let ppm = 201; ppm <= 260; ppm += 1) await faster(ppm);
    await desk.change('patch', '/sheds/south', { name: '100% wool_shed' });
    const page = await server.call('get', '/set-up/changes', { as: desk.actor });
    expect([page.body.changes.length, page.body.more]).toEqual([50, true]);
    const before = String(page.body.changes.at(-1).seq);
    const rest = await server.call('get', '/set-up/changes', { as: desk.actor, query: { before } });
    expect([rest.body.changes.length, rest.body.more]).toEqual([11, false]);
    expect(await desk.record({ q: '100% wool_' })).toHaveLength(1);
    expect(await desk.record({ q: '100_' })).toHaveLength(0);
    expect(await desk.record({ q: 'maud' })).toHaveLength(50);
    expect((await desk.record({ q: '"ppm":233' })).map(({ after, before: was }) => [was, after])).toEqual([
      [{ ppm: 233 }, { ppm: 234 }],
      [{ ppm: 232 }, { ppm: 233 }],
    ]);
  });

  it('cannot be edited or deleted, not even in the file', async () => {
    await faster(210);
    const tries = [
      `UPDATE "recorded_change" SET "byName" = 'Somebody else'`,
      `DELETE FROM "recorded_change"`,
      `INSERT OR REPLACE INTO "recorded_change" ("seq", "at", "byName", "what", "name", "action") VALUES (1, 1, 'x', 'x', 'x', 'x')`,
    ];
    for (const sql of tries)
      await expect(server.deps.writer.write((tx) => tx.query(sql))).rejects.toThrow(
        /record of changes is never/,
      );
    expect(await desk.record()).toMatchObject([{ byName: 'Maud Test', after: { ppm: 210 } }]);
  });

  it('has nothing of what was refused', async () => {
    await desk.refused('patch', '/sheds/south', { name: 'The north shed' });
    expect(await desk.record()).toEqual([]);
  });
});
