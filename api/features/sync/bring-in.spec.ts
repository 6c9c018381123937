import type { BringInResponse } from '../../../shared/contract/sync.js';
import { entry, MINUTE } from '../../testing/test-entries.js';
import { TEST_NOW, testServer, type SignedInActor, type TestServer } from '../../testing/test-server.js';

describe('entries brought in from a file', () => {
  let server: TestServer;
  let weaver: SignedInActor;
  let foreman: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    weaver = await server.signInAs('weaver');
    foreman = await server.signInAs('foreman');
  });
  afterEach(() => server.close());

  const stop = (over: Record<string, unknown> = {}) =>
    entry('stop', {
      loomId: 'n1',
      cause: 'warp-break',
      count: 1,
      at: TEST_NOW,
      grantId: weaver.session.grant?.id ?? '',
      ...over,
    });
  const bringIn = async (entries: unknown[], as = foreman) => {
    const answer = await server.call('post', '/sync/bring-in', { as, body: { entries } });
    expect(answer.status, answer.text).toBe(200);
    return (answer.body as BringInResponse).results;
  };

  it('are the author’s and the tablet’s as before, once', async () => {
    const one = stop();
    expect(await bringIn([one, stop()])).toMatchObject([
      { result: 'stored' },
      { index: 1, result: 'stored' },
    ]);
    expect(await bringIn([one])).toMatchObject([{ id: one.id, result: 'duplicate' }]);
    const [row] = await server.deps.reads.query(`SELECT * FROM "entry" WHERE "id" = ?`, [one.id]);
    expect(row).toMatchObject({ by: 'wanda', deviceId: 'tablet-north', deviceSeq: one.deviceSeq });
    const later = await server.call('post', '/sync/entries', {
      as: weaver,
      body: { sentAt: server.clock.now, entries: [one] },
    });
    expect(later.body.results[0].result).toBe('duplicate');
  });

  it('are corrected by what was last measured of their tablet’s clock', async () => {
    await server.call('post', '/sync/entries', {
      as: weaver,
      body: { sentAt: server.clock.now - 90 * MINUTE, entries: [] },
    });
    const [result] = await bringIn([stop({ at: TEST_NOW - 90 * MINUTE })]);
    expect(result).toMatchObject({ result: 'stored', at: TEST_NOW });
  });

  it('are looked at one by one: strangers’ grants, nonsense, other sheds, newer schemas', async () => {
    const results = await bringIn([
      stop({ grantId: 'nobody-ever-had-this' }),
      { odd: 1 },
      null,
      stop({ shedId: 'south', loomId: 's1' }),
      { ...stop(), schema: 9 },
      stop(),
    ]);
    expect(results.map(({ index, result, code }) => [index, code ?? result])).toEqual([
      [0, 'grant-unknown'],
      [1, 'entry-malformed'],
      [2, 'entry-malformed'],
      [3, 'entry-other-shed'],
      [4, 'later'],
      [5, 'stored'],
    ]);
  });

  it('of a withdrawn tablet wait for a decision', async () => {
    const manager = await server.signInAs('manager');
    await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    expect(await bringIn([stop()], manager)).toMatchObject([{ result: 'held', hold: 'device-revoked' }]);
  });

  it('are at most 500 at once', async () => {
    const body = { entries: Array.from({ length: 501 }, () => ({})) };
    const answer = await server.call('post', '/sync/bring-in', { as: foreman, body });
    expect([answer.status, answer.body.code]).toEqual([413, 'too-many-entries']);
  });
});
