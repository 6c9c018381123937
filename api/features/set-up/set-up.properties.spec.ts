import type { Entry } from '../../../shared/entries/entry.js';
import { Dice, randomHistory } from '../../testing/random-history.js';
import { insertTestGrants, MINUTE, MONDAY } from '../../testing/test-entries.js';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';
import { ingestEntries } from '../book/ingest.js';
import { rebuildBook } from '../book/rebuild.js';

type Asked = readonly ['post' | 'patch', string, object];

const LOOM_FACTS = {
  ppm: 190,
  reedSpaceCm: 190,
  clock: { kind: 'continuous', unit: 100, digits: 5 },
  shuttles: 1,
  battery: false,
};
const CALICO = {
  ends: 4_000,
  picksPerCmOnLoom: 24,
  picksPerCmLoomState: 25,
  reedWidthCm: 170,
  crimp: 0.06,
  abreast: 1,
  wefts: [{ name: 'Grey cotton', tex: 20, share: 1, waste: 0.03, pernMassG: 30 }],
};

/** Something that a manager might change, wisely or not. */
function anyChange(dice: Dice, n: number): Asked {
  const effectiveAt = MONDAY + (dice.upTo(30 * 60) - 120) * MINUTE;
  const loomId = dice.of(['n1', 'n2', 'n3', 'n4']);
  const date = dice.of(['2026-03-08', '2026-03-09', '2026-03-10', '2026-03-11']);
  const place = (number: number) => ({
    number,
    row: 1 + dice.upTo(3),
    position: 1 + dice.upTo(3),
    alley: dice.of(['A', 'B']),
  });
  const clock = dice.of([
    LOOM_FACTS.clock,
    { kind: 'continuous', unit: 10, digits: 6 },
    { kind: 'register-a-shift', unit: 100, digits: 5 },
  ]);
  const hours = dice.of([
    ['early', '06:00', '14:00'],
    ['early', '07:00', '14:00'],
    ['late', '14:00', '21:30'],
    ['night', '22:00', '05:00'],
  ] as const);
  const [name, startsLocal, endsLocal] = hours;
  const day = { shedId: 'north', date, patternId: dice.of(['*', `north-${name}`]) };
  return dice.of<Asked>([
    ['post', '/looms/versions', { loomIds: [loomId], effectiveAt, facts: { ppm: 150 + dice.upTo(100) } }],
    ['post', '/looms/versions', { loomIds: [loomId], effectiveAt, facts: { clock } }],
    ['post', '/looms', { shedId: 'north', from: effectiveAt, places: [place(10 + n)], facts: LOOM_FACTS }],
    ['patch', '/looms', { looms: [{ id: loomId, ...place(Number(loomId.slice(1))) }] }],
    ['patch', `/looms/${loomId}/until`, { until: dice.of([null, effectiveAt]) }],
    [
      'post',
      '/causes/warp-break/versions',
      {
        effectiveAt,
        facts: {
          name: 'Warp break',
          group: 'warp',
          attendedBy: 'weaver',
          allowanceS: dice.upTo(200),
          breakOf: 'warp',
        },
      },
    ],
    [
      'post',
      '/cloths/calico/versions',
      { effectiveAt, facts: { ...CALICO, ends: 3_000 + dice.upTo(2_000) } },
    ],
    [
      'patch',
      `/patterns/north-${name}`,
      { from: date, facts: { name, startsLocal, endsLocal, weekdays: [1, 2, 3, 4, 5, 6, 7], meal: null } },
    ],
    ['post', '/calendar', { ...day, kind: 'off', startsLocal: null, endsLocal: null, reason: 'Fair' }],
    ['post', '/calendar/drop', day],
    ['post', '/recalculate', { shedId: 'north', from: date, reason: 'Again' }],
  ]);
}

describe('set-up changed among entries', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
  });
  afterEach(() => server.close());

  const push = (entries: readonly Entry[]) =>
    server.deps.writer.write((tx) =>
      ingestEntries(tx, entries, {
        deviceId: null,
        deviceRevoked: false,
        tabletShedId: 'north',
        sentAt: TEST_NOW,
        serverNow: TEST_NOW,
      }),
    );
  const signed = () =>
    server.deps.reads.query<object[]>(`SELECT * FROM "signed_totals" ORDER BY "shiftKey", "version"`);

  it.each([1, 2, 3, 4, 32])(
    'gives the same bytes after a rebuild, and unsigns nothing (history %i)',
    async (seed) => {
      const dice = new Dice(seed);
      const waiting = dice.stirred(randomHistory(dice, 150, { decisions: true }), 8);
      const answers = new Map<number, number>();
      for (let n = 0; waiting.length > 0; n += 1) {
        await push(waiting.splice(0, 1 + dice.upTo(12)));
        const before = await signed();
        const [method, path, body] = anyChange(dice, n);
        const { status, text } = await server.call(method, `/set-up${path}`, { as: desk.actor, body });
        expect([200, 400, 404], text).toContain(status);
        answers.set(status, (answers.get(status) ?? 0) + 1);
        // No change of set-up takes back or edits what was signed; a recalculation adds to it.
        expect(await signed()).toEqual(expect.arrayContaining(before));
        if (n % 8 === 0)
          expect(await server.deps.writer.write(rebuildBook)).toMatchObject({
            different: [],
            unlikeSigned: [],
          });
      }
      expect(answers.get(200)).toBeGreaterThan(10);
      const rebuilt = await server.deps.writer.write(rebuildBook);
      expect(rebuilt).toMatchObject({ different: [], unlikeSigned: [] });
      expect(rebuilt.signedShifts).toBeGreaterThan(0);
    },
  );
});
