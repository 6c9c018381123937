import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ShiftList, ShiftSheet, Weeks } from '../../../shared/contract/reports.js';
import type { EntryKind } from '../../../shared/entries/entry.js';
import { ingestEntries } from '../book/ingest.js';
import {
  EARLY,
  entry,
  HOUR,
  insertTestGrants,
  LATE,
  MINUTE,
  MONDAY,
  type Said,
} from '../../testing/test-entries.js';
import { testServer, type SignedInActor, type TestServer } from '../../testing/test-server.js';

describe('reports', () => {
  let server: TestServer;
  let foreman: SignedInActor;

  beforeAll(async () => {
    server = await testServer();
    foreman = await server.signInAs('foreman');
    await server.deps.writer.write(insertTestGrants);
    const stands = entry('standing', { loomId: 'n2', cause: 'picking', at: MONDAY + HOUR });
    await ingest([
      entry('assign', { shiftKey: EARLY, weaverId: 'wanda', loomIds: ['n1', 'n2'], at: MONDAY }),
      reading('n1', EARLY, 'start', 100, MONDAY),
      reading('n1', EARLY, 'end', 964, MONDAY + 8 * HOUR),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 3, at: MONDAY + 2 * HOUR }),
      reading('n2', EARLY, 'start', 99_900, MONDAY),
      reading('n2', EARLY, 'end', 380, MONDAY + 8 * HOUR),
      stands,
      entry('resume', { loomId: 'n2', targetId: stands.id, at: MONDAY + 2 * HOUR }),
      reading('n3', EARLY, 'start', 5, MONDAY),
      // An open shift: not in Weeks.
      reading('n1', LATE, 'end', 1_900, MONDAY + 16 * HOUR),
      entry('close', { who: 'foreman', shiftKey: EARLY, at: MONDAY + 8 * HOUR + MINUTE }),
    ]);
  });
  afterAll(() => server.close());

  const reading = (loomId: string, shiftKey: string, boundary: 'start' | 'end', value: number, at: number) =>
    entry('reading', { loomId, shiftKey, boundary, value, at } as Said<'reading'>);
  const ingest = async (entries: { kind: EntryKind }[]) => {
    const now = server.clock.now;
    const { results } = await server.deps.writer.write((tx) =>
      ingestEntries(tx, entries, {
        deviceId: null,
        deviceRevoked: false,
        tabletShedId: null,
        sentAt: now,
        serverNow: now,
      }),
    );
    expect(results.map((one) => one.result)).toEqual(entries.map(() => 'stored'));
  };
  const get = async <T>(path: string, query: Record<string, string> = {}) => {
    const answer = await server.call('get', path, { as: foreman, query });
    expect(answer.status, answer.text).toBe(200);
    return answer.body as T;
  };

  it('shows a sheet with a line for every loom of the shed, figures as worked out by hand', async () => {
    const sheet = await get<ShiftSheet>(`/reports/shifts/${EARLY}/sheet`);
    expect(sheet.lines.map((line) => line.loomNumber)).toEqual([1, 2, 3, 4]);
    const [first, second, third, fourth] = sheet.lines;
    // 200 ppm × 480 min = 96,000 possible; (964 − 100) × 100 = 86,400 woven.
    expect(first?.figures).toMatchObject({ picks: 86_400, efficiency: 0.9, warp: { count: 3 } });
    expect(first?.figures.warp.rate).toBeCloseTo((3 / 86_400) * 1e5, 9);
    expect(first?.weaverNames).toEqual(['Wanda Test']);
    // Over the top of a five-digit clock: (380 − 99,900 + 100,000) × 100 = 48,000.
    expect(second?.figures).toMatchObject({ picks: 48_000, efficiency: 0.5, measuredMinutes: 60 });
    expect(third?.figures.efficiency).toEqual({ none: 'no-end-reading' });
    expect(fourth?.figures.efficiency).toEqual({ none: 'no-start-reading' });
    // Ratio of sums: (86,400 + 48,000) ÷ (2 × 96,000).
    expect(sheet.total).toMatchObject({ lines: 4, linesLeftOut: 2, figures: { efficiency: 0.7 } });
    expect(sheet.closed).toMatchObject({ by: 'Fred Test', version: 1 });
    expect(sheet.shedName).toBe('The north shed');
  });

  it('shows a sheet of a shift that nobody has touched, loom by loom', async () => {
    const sheet = await get<ShiftSheet>('/reports/shifts/north:2026-03-12:north-night/sheet');
    expect(sheet.lines).toHaveLength(4);
    expect(sheet.total.linesLeftOut).toBe(4);
    expect(sheet.closed).toBeNull();
  });

  it('lists shifts with the same figures as their sheets', async () => {
    const { shifts } = await get<ShiftList>('/reports/shifts', {
      shedId: 'north',
      from: '2026-03-09',
      to: '2026-03-09',
    });
    expect(shifts.map((one) => one.shift.key)).toEqual([EARLY, LATE, expect.stringContaining('night')]);
    const sheet = await get<ShiftSheet>(`/reports/shifts/${EARLY}/sheet`);
    expect(shifts[0]?.group?.figures).toEqual({ ...sheet.total.figures, atMost: null });
    expect(shifts[2]?.group).toBeNull();
  });

  it('shows weeks by loom and by row as ratios of sums over closed shifts', async () => {
    const asked = { shedId: 'north', from: '2026-03-02', to: '2026-03-09' };
    const byLoom = await get<Weeks>('/reports/weeks', { ...asked, by: 'loom' });
    expect(byLoom.weeks).toEqual(['2026-03-02', '2026-03-09']);
    expect(byLoom.rows.map((row) => row.label)).toEqual(['1', '2', '3', '4']);
    expect(byLoom.rows[0]?.cells[0]).toBeNull();
    expect(byLoom.rows[0]?.cells[1]).toMatchObject({ lines: 1, figures: { efficiency: 0.9, picks: 86_400 } });
    const byRow = await get<Weeks>('/reports/weeks', { ...asked, by: 'row' });
    expect(byRow.rows.map((row) => row.key)).toEqual(['1', '2']);
    expect(byRow.rows[0]?.cells[1]?.figures.efficiency).toBe(0.7);
    expect(byRow.total[1]).toMatchObject({ lines: 4, linesLeftOut: 2, figures: { efficiency: 0.7 } });
    expect(byRow.openShifts).toBe(1);
  });

  it('keeps to the sheds that the person may see, and to shifts that exist', async () => {
    const code = async (path: string, query: Record<string, string> = {}) => {
      const answer = await server.call('get', path, { as: foreman, query });
      return [answer.status, (answer.body as { code: string }).code];
    };
    const south = { shedId: 'south', from: '2026-03-09', to: '2026-03-09', by: 'loom' };
    expect(await code('/reports/weeks', south)).toEqual([403, 'other-shed']);
    expect(await code('/reports/shifts', south)).toEqual([403, 'other-shed']);
    expect(await code('/reports/shifts/south:2026-03-09:south-early/sheet')).toEqual([403, 'other-shed']);
    expect(await code('/reports/shifts/no-such-shift/sheet')).toEqual([404, 'not-found']);
    const backwards = { shedId: 'north', from: '2026-03-09', to: '2026-03-01' };
    expect(await code('/reports/shifts', backwards)).toEqual([400, 'bad-request']);
    const { sheds } = await get<{ sheds: { id: string }[] }>('/reports/sheds');
    expect(sheds.map((shed) => shed.id)).toEqual(['north']);
  });
});
