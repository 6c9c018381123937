import 'fake-indexeddb/auto';
import { rmSync } from 'node:fs';
import { MANAGER_DESK } from './faults/run';
import { revokeDevice } from '../../api/features/devices/devices.service.js';
import { TEST_PEOPLE } from '../../api/testing/test-server.js';
import { FaultServer } from './faults/fault-server';
import { FaultTablet } from './faults/fault-tablet';
import { NO_SABOTAGE } from './faults/sabotage';
import { tabletId, templateMill } from './faults/template-mill';

const DAY = 86_400_000;

describe('a withdrawn tablet, which may only hand in', () => {
  let template: string;
  let server: FaultServer;
  let tablet: FaultTablet;
  beforeAll(async () => {
    template = await templateMill();
  });
  afterAll(() => rmSync(template, { recursive: true, force: true }));
  beforeEach(async () => {
    server = await FaultServer.start(template);
    tablet = new FaultTablet({
      id: tabletId(0),
      faults: [],
      url: () => server.url,
      now: () => server.clock.now,
      clockError: 0,
      sabotage: NO_SABOTAGE,
    });
  });
  afterEach(() => server.close());

  const tap = async (): Promise<string> => {
    const entry = await tablet.log(TEST_PEOPLE.weaver.id, {
      kind: 'stop',
      loomId: 'n1',
      cause: 'warp-break',
      count: 1,
    });
    server.clock.now += 1_000;
    return entry?.id ?? '';
  };
  const book = () =>
    server.deps.reads.query<{ id: string; by: string; reason: string | null }[]>(
      `SELECT e."id", e."by", h."reason" FROM "entry" e LEFT JOIN "entry_hold" h ON h."entryId" = e."id"
        ORDER BY e."deviceSeq"`,
    );

  it.each(['restored backup', 'copied file'] as const)(
    'sends again, without anything new to send, what a %s lacks; it is held',
    async (how) => {
      const old = await tap();
      await tablet.exchange();
      server.clock.now += 15 * DAY;
      await revokeDevice(server.deps, MANAGER_DESK, tablet.id);
      const kept = await tap();
      await tablet.exchange();
      await server.takeBackup();
      const lost = [await tap(), await tap()];
      await tablet.exchange();
      expect(await book()).toHaveLength(4);

      await server.putBack(how);
      expect(await book()).toHaveLength(2);
      await tablet.exchange();
      expect(await book()).toEqual([
        { id: old, by: 'wanda', reason: null },
        ...[kept, ...lost].map((id) => ({ id, by: 'wanda', reason: 'device-revoked' })),
      ]);
      expect(await tablet.waiting()).toBe(0);
    },
  );
});
