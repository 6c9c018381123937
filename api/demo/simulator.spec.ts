import { DateTime } from 'luxon';
import { entrySchema, type Entry } from '../../shared/entries/entry.js';
import type { Shift } from '../../shared/contract/reference.js';
import { datesBetween, shiftsOn } from '../features/book/pattern-shifts.js';
import { shiftOf } from '../features/book/which-shift.js';
import { demoBegins, demoCalendar, demoPatterns } from './calendar.js';
import { DEMO_ZONE, demoMill } from './mill.js';
import { demoPeople } from './people.js';
import { simulate, type Simulation } from './simulator.js';

const NOW = Date.parse('2026-12-01T11:20:00Z');
const begins = demoBegins(NOW);
const mill = demoMill(begins);
const shifts = shiftsUntil(NOW);
const run = (seed: number): Simulation =>
  simulate({
    seed,
    now: NOW,
    mill,
    people: demoPeople(),
    shifts,
    patterns: demoPatterns().map((pattern) => pattern.id),
  });
const entriesOf = (simulation: Simulation): Entry[] => simulation.pushes.flatMap((push) => push.entries);

describe('the demo’s simulator', () => {
  const first = run(7);
  const entries = entriesOf(first);

  it('makes the same mill from the same seed, and another from another', () => {
    expect(JSON.stringify(run(7))).toBe(JSON.stringify(first));
    expect(JSON.stringify(run(8))).not.toBe(JSON.stringify(first));
  });

  it('makes entries that the contract takes, numbered without gaps on each device', () => {
    for (const entry of entries)
      expect(entrySchema.safeParse(entry).success, JSON.stringify(entry)).toBe(true);
    for (const device of ['demo-tablet-a', 'demo-tablet-b', 'demo-office']) {
      const numbers = entries.filter((e) => e.deviceId === device).map((e) => e.deviceSeq);
      expect(numbers.sort((a, b) => a - b)).toEqual(numbers.map((_, i) => i + 1));
    }
    expect(new Set(entries.map((e) => e.id)).size).toBe(entries.length);
  });

  it('knows nothing of the future, and has a shift in progress', () => {
    expect(Math.max(...entries.map((e) => e.recordedAt))).toBeLessThanOrEqual(NOW);
    const current = shifts[shifts.length - 1]!;
    const taps = entries.filter((e) => e.kind === 'stop' && e.at >= current.startsAt);
    expect(taps.length).toBeGreaterThan(50);
  });

  it('weaves at what a shed gives: 75 to 92% over all, by its own readings', () => {
    let picks = 0;
    let possible = 0;
    for (const [shiftKey, looms] of readings(entries)) {
      const shift = shifts.find((s) => s.key === shiftKey)!;
      const minutes =
        (shift.endsAt -
          shift.startsAt -
          (shift.meal?.looms === 'stopped' ? shift.meal.endsAt - shift.meal.startsAt : 0)) /
        60_000;
      for (const [loomId, { start, end }] of looms) {
        if (start === undefined || end === undefined) continue;
        const version = mill.loomVersions.find((v) => v.loomId === loomId)!;
        const range = 10 ** version.clock.digits;
        const woven = ((((end - start) % range) + range) % range) * version.clock.unit;
        if (woven > version.ppm * minutes * 1.05 + version.clock.unit) continue;
        picks += woven;
        possible += version.ppm * minutes;
      }
    }
    expect(picks / possible).toBeGreaterThan(0.75);
    expect(picks / possible).toBeLessThan(0.92);
  });

  it('has breaks more scattered than Poisson allows', () => {
    const counts = new Map<string, number>();
    for (const e of entries)
      if (e.kind === 'stop' && e.cause === 'warp-break' && e.loomId === 'loom-1') {
        const key = shifts.find((s) => s.startsAt <= e.at && e.at < s.endsAt)?.key ?? '';
        counts.set(key, (counts.get(key) ?? 0) + 1);
      }
    const values = shifts.map((s) => counts.get(s.key) ?? 0);
    const mean = values.reduce((a, b) => a + b, 0) / values.length;
    const variance = values.reduce((a, b) => a + (b - mean) ** 2, 0) / (values.length - 1);
    expect(variance / mean).toBeGreaterThan(1.2);
  });

  it('lets loom 11 get worse in weft, loom 17 in warp, loom 5 better in warp', () => {
    const perWeek = (loom: number, cause: string, from: number, to: number): number =>
      entries.filter(
        (e) =>
          e.kind === 'stop' &&
          e.loomId === `loom-${loom}` &&
          e.cause === cause &&
          e.at >= NOW - from * 604_800_000 &&
          e.at < NOW - to * 604_800_000,
      ).length /
      (from - to);
    expect(perWeek(11, 'weft-break', 3, 0) / perWeek(11, 'weft-break', 11, 3)).toBeGreaterThan(2);
    expect(perWeek(17, 'warp-break', 2, 0) / perWeek(17, 'warp-break', 11, 5)).toBeGreaterThan(1.8);
    expect(perWeek(5, 'warp-break', 3, 0) / perWeek(5, 'warp-break', 11, 3)).toBeLessThan(0.6);
  });

  it('holds every kind of happening that the screens have to show', () => {
    const kinds = new Set(entries.map((e) => e.kind));
    for (const kind of [
      'reading',
      'stop',
      'standing',
      'resume',
      'shed-stop',
      'assign',
      'count',
      'call',
      'attend',
      'repair',
      'warp-change',
      'void',
      'amend',
      'close',
      'accept',
    ] as const)
      expect(kinds, kind).toContain(kind);
    const closed = entries.filter((e) => e.kind === 'close').length;
    expect(closed).toBe(shifts.filter((s) => s.endsAt <= NOW).length - 1);
  });

  it('makes a weekend’s day a working day, so that a shift is in progress then too', () => {
    const sunday = Date.parse('2026-11-29T12:00:00Z');
    expect(demoCalendar(sunday).filter((day) => day.kind === 'overtime')).toHaveLength(3);
    expect(demoCalendar(NOW).filter((day) => day.kind === 'overtime')).toHaveLength(0);
  });
});

function readings(all: readonly Entry[]): Map<string, Map<string, { start?: number; end?: number }>> {
  const byShift = new Map<string, Map<string, { start?: number; end?: number }>>();
  for (const e of all) {
    if (e.kind !== 'reading' || (e.boundary !== 'start' && e.boundary !== 'end')) continue;
    const looms = byShift.get(e.shiftKey) ?? new Map<string, { start?: number; end?: number }>();
    byShift.set(e.shiftKey, looms.set(e.loomId, { ...looms.get(e.loomId), [e.boundary]: e.value }));
  }
  return byShift;
}

/** The shifts that have begun, as the server makes them. */
function shiftsUntil(now: number): Shift[] {
  const date = (at: number): string => DateTime.fromMillis(at, { zone: DEMO_ZONE }).toISODate() ?? '';
  return datesBetween(date(begins), date(now))
    .flatMap((day) => shiftsOn(day, demoPatterns(), demoCalendar(now), DEMO_ZONE))
    .map(shiftOf)
    .filter((shift) => shift.startsAt <= now);
}
