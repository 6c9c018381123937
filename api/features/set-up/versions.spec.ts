import type { Entry } from '../../../shared/entries/entry.js';
import { EARLY, entry, HOUR, insertTestGrants, MINUTE, MONDAY, TUESDAY } from '../../testing/test-entries.js';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { TEST_NOW, testServer, testShiftKey, type TestServer } from '../../testing/test-server.js';
import { rebuildBook } from '../book/rebuild.js';

interface LineBytes {
  loomId: string;
  possiblePicks: number | null;
  line: string;
}

describe('what is changed from a moment on', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
  });
  afterEach(() => server.close());

  const push = async (...entries: Entry[]) => {
    const body = { sentAt: server.clock.now, entries };
    const answer = await server.call('post', '/sync/entries', { as: await server.tablet(), body });
    return answer.body.results as { result: string; hold?: string; shiftKey: string | null }[];
  };
  const linesOf = (shiftKey: string) =>
    server.deps.reads.query<LineBytes[]>(`SELECT * FROM "loom_line" WHERE "shiftKey" = ? ORDER BY "loomId"`, [
      shiftKey,
    ]);
  const lineOf = async (shiftKey: string, loomId: string) =>
    (await linesOf(shiftKey)).find((one) => one.loomId === loomId);
  const signed = async (key: string) => {
    const answer = await server.call('get', `/reports/shifts/${key}/signed`, { as: desk.actor });
    return answer.body.versions as {
      version: number;
      how: string;
      by: string;
      words: string | null;
      changed: { loomId: string }[];
    }[];
  };
  const rebuilt = async () => {
    const { different, unlikeSigned } = await server.deps.writer.write(rebuildBook);
    return { different, unlikeSigned };
  };
  const SAME = { different: [], unlikeSigned: [] };

  const reading = (loomId: string, shiftKey: string, boundary: 'start' | 'end', value: number, at: number) =>
    entry('reading', { loomId, shiftKey, boundary, value, at });
  /** Monday's early shift as logged and closed, and Tuesday's as it runs. */
  const closeMonday = async (): Promise<void> => {
    await push(
      entry('warp-change', {
        who: 'tackler',
        loomId: 'n1',
        how: 'as-found',
        warpId: null,
        clothId: 'calico',
        at: MONDAY - HOUR,
      }),
      reading('n1', EARLY, 'start', 1_000, MONDAY),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 3, at: MONDAY + HOUR }),
      reading('n1', EARLY, 'end', 1_800, MONDAY + 8 * HOUR),
      entry('stop', { loomId: 'n1', cause: 'weft-break', count: 1, at: TEST_NOW - HOUR }),
      reading('n1', TUESDAY, 'start', 3_000, TEST_NOW - 3 * HOUR - 30 * MINUTE),
      entry('close', { who: 'foreman', shiftKey: EARLY, at: TEST_NOW - MINUTE }),
    );
    expect(await signed(EARLY)).toHaveLength(1);
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
  const faster = (effectiveAt: number, ppm = 250) =>
    desk.change('post', '/looms/versions', { loomIds: ['n1'], effectiveAt, facts: { ppm } });

  it('leaves what was signed as it is, to the byte, and changes the shift that is open', async () => {
    await closeMonday();
    const [monday, tuesday] = [await linesOf(EARLY), await lineOf(TUESDAY, 'n1')];
    expect(tuesday?.possiblePicks).toBe(200 * 480);
    await faster(MONDAY + 4 * HOUR);
    expect(await linesOf(EARLY)).toEqual(monday);
    expect((await lineOf(TUESDAY, 'n1'))?.possiblePicks).toBe(250 * 480);
    expect(await rebuilt()).toEqual(SAME);
    await desk.change('post', '/causes/warp-break/versions', {
      effectiveAt: MONDAY - 24 * HOUR,
      facts: { name: 'Warp break', group: 'warp', attendedBy: 'weaver', allowanceS: 120, breakOf: 'warp' },
    });
    await desk.change('post', '/cloths/calico/versions', {
      effectiveAt: MONDAY,
      facts: { ...CALICO, ends: 5_000 },
    });
    expect(await linesOf(EARLY)).toEqual(monday);
    expect(JSON.parse((await lineOf(TUESDAY, 'n1'))?.line ?? '').stretches[0].ends).toBe(5_000);
    expect(await rebuilt()).toEqual(SAME);
  });

  it('recalculates from a date, with a reason, as a signed version beside the old one', async () => {
    await closeMonday();
    await faster(MONDAY + 4 * HOUR);
    const before = await server.deps.reads.query(`SELECT * FROM "signed_totals"`);
    const command = { shedId: 'north', from: '2026-03-02', reason: 'The book had the old pulley' };
    const ask = () => server.call('post', '/set-up/recalculate', { as: desk.actor, body: command });
    expect((await ask()).body).toEqual({ shifts: 1, changed: [EARLY] });
    expect((await lineOf(EARLY, 'n1'))?.possiblePicks).toBe((200 + 250) * 240);
    const [first, second] = await signed(EARLY);
    expect(first?.how).toBe('close');
    expect(second).toMatchObject({ version: 2, how: 'recalculate', by: 'Maud Test', words: command.reason });
    expect(second?.changed.map(({ loomId }) => loomId)).toEqual(['n1']);
    expect(await server.deps.reads.query(`SELECT * FROM "signed_totals" WHERE "version" = 1`)).toEqual(
      before,
    );
    expect(await server.deps.reads.query(`SELECT "state" FROM "shift" WHERE "key" = ?`, [EARLY])).toEqual([
      { state: 'closed' },
    ]);
    expect(await rebuilt()).toEqual(SAME);
    expect((await desk.record({ q: 'pulley' }))[0]).toMatchObject({
      action: 'command',
      reason: command.reason,
      byName: 'Maud Test',
    });
    // Nothing else is to be stated: no third version.
    expect((await ask()).body).toEqual({ shifts: 1, changed: [] });
    expect(await signed(EARLY)).toHaveLength(2);
    // Of a later date, or another shed, there is nothing.
    for (const other of [{ from: '2026-03-10' }, { shedId: 'south' }])
      expect(
        (await server.call('post', '/set-up/recalculate', { as: desk.actor, body: { ...command, ...other } }))
          .body.shifts,
      ).toBe(0);
  });

  it('keeps held what is held for a recalculated shift', async () => {
    await closeMonday();
    const [late] = await push(
      entry('stop', { loomId: 'n1', cause: 'smash', count: 1, at: MONDAY + 2 * HOUR, recordedAt: TEST_NOW }),
    );
    expect(late).toMatchObject({ result: 'held', hold: 'shift-closed' });
    await faster(MONDAY - HOUR);
    const command = { shedId: 'north', from: '2026-03-09', reason: 'Speed' };
    await server.call('post', '/set-up/recalculate', { as: desk.actor, body: command });
    const held = await server.call('get', `/reports/shifts/${EARLY}/held`, { as: desk.actor });
    expect(held.body.entries).toHaveLength(1);
    expect(JSON.parse((await lineOf(EARLY, 'n1'))?.line ?? '').stops).toHaveLength(1);
    expect(await rebuilt()).toEqual(SAME);
  });

  it('refuses a recalculation without a reason, of no date and of no shed', async () => {
    const refused = async (body: object) =>
      (
        await desk.refused('post', '/recalculate', {
          shedId: 'north',
          from: '2026-03-09',
          reason: 'Speed',
          ...body,
        })
      ).fields;
    expect((await refused({ reason: '' }))['reason']).toMatch(/Too small/);
    expect((await refused({ from: '2026-02-30' }))['from']).toMatch(/no such date/);
    expect((await refused({ shedId: 'west' }))['shedId']).toMatch(/no such shed/);
  });

  it('knows after closing which clock a loom had before', async () => {
    const clock = { kind: 'continuous', unit: 10, digits: 6 };
    await desk.change('post', '/looms/versions', { loomIds: ['n1'], effectiveAt: MONDAY, facts: { clock } });
    await push(
      reading('n1', testShiftKey('2026-03-08', 'night'), 'end', 1_000, MONDAY),
      reading('n1', EARLY, 'end', 9_000, MONDAY + 8 * HOUR),
      entry('close', { who: 'foreman', shiftKey: EARLY, at: TEST_NOW }),
    );
    expect(await rebuilt()).toEqual(SAME);
  });

  it('gives a loom that comes in mid-shift its line, and takes away the line of one that goes', async () => {
    await closeMonday();
    expect(await linesOf(TUESDAY)).toHaveLength(4);
    const facts = {
      ppm: 180,
      reedSpaceCm: 190,
      clock: { kind: 'continuous', unit: 100, digits: 5 },
      shuttles: 1,
      battery: false,
    };
    const places = [{ number: 5, row: 3, position: 1, alley: 'B' }];
    const [id = ''] = await desk.change('post', '/looms', {
      shedId: 'north',
      from: TEST_NOW - HOUR,
      places,
      facts,
    });
    expect((await lineOf(TUESDAY, id))?.possiblePicks).toBe(180 * 480);
    await desk.change('patch', '/looms/n4/until', { until: TEST_NOW - 4 * HOUR });
    expect(await lineOf(TUESDAY, 'n4')).toBeUndefined();
    // What was signed shows the looms that were signed.
    expect((await linesOf(EARLY)).map(({ loomId }) => loomId)).toEqual(['n1', 'n2', 'n3', 'n4']);
    expect(await rebuilt()).toEqual(SAME);
    await desk.change('patch', '/looms/n4/until', { until: null });
    expect(await lineOf(TUESDAY, 'n4')).toBeDefined();
  });

  it('does not let a loom go while it stands, or before what was last logged of it', async () => {
    await closeMonday();
    const until = async (at: number) =>
      (await desk.refused('patch', '/looms/n1/until', { until: at })).fields['until'];
    expect(await until(TEST_NOW - 2 * HOUR)).toMatch(
      /logged of loom 1 at 10 Mar 2026, 08:30\. Choose a later time/,
    );
    const stop = entry('standing', { loomId: 'n1', cause: 'smash', at: TEST_NOW - 10 * MINUTE });
    await push(stop);
    expect(await until(TEST_NOW)).toMatch(
      /Loom 1 stands since 10 Mar 2026, 09:20\. Say when that stop ended/,
    );
    await push(entry('resume', { loomId: 'n1', targetId: stop.id, at: TEST_NOW - MINUTE }));
    await push(entry('shed-stop', { cause: 'power', scope: { of: 'shed' }, at: TEST_NOW }));
    await desk.change('patch', '/looms/n1/until', { until: TEST_NOW });
    expect(await rebuilt()).toEqual(SAME);
  });

  it('leaves a stop of a whole row with the looms that stood in it then', async () => {
    const power = entry('shed-stop', {
      cause: 'power',
      scope: { of: 'row', row: 1 },
      at: TEST_NOW - HOUR,
      until: TEST_NOW - 30 * MINUTE,
    });
    const all = entry('shed-stop', {
      cause: 'power',
      scope: { of: 'shed' },
      at: TEST_NOW - 20 * MINUTE,
      until: TEST_NOW - 15 * MINUTE,
    });
    await push(power, all);
    const stops = async (loomId: string) =>
      JSON.parse((await lineOf(TUESDAY, loomId))?.line ?? '').stops.length as number;
    const at = (id: string, number: number, row: number, position: number) => ({
      id,
      number,
      row,
      position,
      alley: 'A',
    });
    await desk.change('patch', '/looms', { looms: [at('n1', 1, 2, 1), at('n3', 3, 1, 1)] });
    await faster(TEST_NOW - 5 * MINUTE);
    expect([await stops('n1'), await stops('n3')]).toEqual([2, 1]);
    expect(await rebuilt()).toEqual(SAME);
    // A tablet is told the looms by name where its plan would say others.
    const pulled = await server.call('get', '/sync/changes', { as: await server.tablet() });
    const sent = pulled.body.entries as { entry: { id: string; scope: object } }[];
    const scopeOf = (id: string) => sent.find((one) => one.entry.id === id)?.entry.scope;
    expect(scopeOf(power.id)).toEqual({ of: 'looms', loomIds: ['n1', 'n2'] });
    expect(scopeOf(all.id)).toEqual({ of: 'shed' });
  });

  it('takes from a manager in the office what is on the looms, before there is any shift', async () => {
    await server.deps.writer.write((tx) => tx.query(`DELETE FROM "shift"`));
    const { id: deviceId } = desk.actor.session.device ?? { id: '' };
    const grantId = desk.actor.session.grant?.id ?? '';
    const [beam = ''] = await desk.change('post', '/beams', {
      name: 'B 1',
      clothId: 'calico',
      lengthM: 900,
      thrumM: 2,
    });
    const found = entry('warp-change', {
      who: 'manager',
      loomId: 'n2',
      how: 'as-found',
      warpId: beam,
      clothId: 'calico',
      at: TEST_NOW - MINUTE,
      deviceId,
      grantId,
    });
    const body = { sentAt: server.clock.now, entries: [found] };
    const answer = await server.call('post', '/sync/entries', { as: desk.actor, body });
    expect(answer.body.results).toMatchObject([{ result: 'stored', shiftKey: null }]);
    expect((await desk.read()).beams).toMatchObject([{ id: beam, onLoomId: 'n2', used: true }]);
    await desk.change('post', '/patterns/north-night/end', { from: '2026-03-10' });
    await desk.change('patch', '/patterns/north-early', {
      from: '2026-03-10',
      facts: { name: 'early', startsLocal: '06:00', endsLocal: '14:00', weekdays: [2], meal: null },
    });
    await push(entry('stop', { loomId: 'n2', cause: 'warp-break', count: 1, at: TEST_NOW }));
    const { stretches } = JSON.parse((await lineOf(TUESDAY, 'n2'))?.line ?? '');
    expect(stretches.at(-1)).toMatchObject({ clothId: 'calico', warpId: beam });
    expect(await rebuilt()).toEqual(SAME);
  });
});
