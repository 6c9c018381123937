import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Shift } from '../contract/reference.js';
import { lineTotals } from '../figures/loom-line.js';
import { sumTotals } from '../figures/totals.js';
import { entriesOfActs } from '../testing/acts.js';
import { anyActs, anyRootAct, stopActs } from '../testing/any-acts.js';
import {
  aClothVersion,
  aFitting,
  aLineInput,
  aLoomVersion,
  aShift,
  at,
  entryBuilder,
  someCauses,
} from '../testing/builders.js';
import type { BookEntry } from './entry.js';
import { loomLineSchema, type LineTotals } from './loom-line.js';
import { projectLine } from './projection.js';

const bytes = (entries: readonly BookEntry[]) => JSON.stringify(projectLine(aLineInput({ entries })));

describe('projectLine, whatever is logged', () => {
  it('does not depend on the order of arrival, nor on what arrives twice', () => {
    const shuffled = anyActs.chain((acts) => {
      const entries = entriesOfActs(acts);
      return fc.tuple(
        fc.constant(entries),
        fc.shuffledSubarray([...entries, ...entries], { minLength: entries.length * 2 }),
      );
    });
    fc.assert(
      fc.property(shuffled, ([entries, arrived]) => {
        expect(bytes(arrived)).toBe(bytes(entries));
      }),
      { numRuns: 300 },
    );
  });

  it('does not depend on the order of versions and fittings, nor on those of other looms', () => {
    const versions = [
      aLoomVersion(),
      aLoomVersion({ id: 'faster', effectiveAt: at(200), ppm: 200 }),
      aLoomVersion({ id: 'other', loomId: 'loom-2', effectiveAt: at(100), ppm: 90 }),
    ];
    const fittings = [
      aFitting(),
      aFitting({ id: 'f2', effectiveAt: at(300), clothId: 'cloth-2' }),
      aFitting({ id: 'f3', loomId: 'loom-2', effectiveAt: at(150), clothId: 'cloth-2' }),
    ];
    const cloths = [aClothVersion(), aClothVersion({ clothId: 'cloth-2', ends: 2000 })];
    fc.assert(
      fc.property(anyActs, (acts) => {
        const entries = entriesOfActs(acts);
        const common = { entries, loomVersions: versions, fittings, clothVersions: cloths };
        const turned = {
          entries,
          loomVersions: [...versions].reverse(),
          fittings: [...fittings].reverse(),
          clothVersions: [...cloths].reverse(),
          causeVersions: [...someCauses()].reverse(),
        };
        expect(JSON.stringify(projectLine(aLineInput(turned)))).toBe(
          JSON.stringify(projectLine(aLineInput(common))),
        );
      }),
      { numRuns: 100 },
    );
  });

  it('takes a voided entry as never logged', () => {
    fc.assert(
      fc.property(anyActs, anyRootAct, (acts, extra) => {
        const entries = entriesOfActs(acts);
        const logged = entriesOfActs([extra], 1000);
        const { book } = entryBuilder(2000);
        const voids = logged.map((one) => book('void', 500, { targetId: one.entry.id }));
        expect(bytes([...entries, ...logged, ...voids])).toBe(bytes(entries));
      }),
      { numRuns: 300 },
    );
  });

  it('takes a voided void as never made', () => {
    fc.assert(
      fc.property(anyActs, fc.nat(15), (acts, which) => {
        const entries = entriesOfActs(acts);
        const target = entries[which % Math.max(1, entries.length)];
        fc.pre(target !== undefined && target.entry.kind !== 'void');
        const { book } = entryBuilder(1000);
        const undo = book('void', 500, { targetId: target!.entry.id });
        const redo = book('void', 501, { targetId: undo.entry.id });
        expect(bytes([...entries, undo, redo])).toBe(bytes(entries));
      }),
      { numRuns: 200 },
    );
  });

  it('always makes a line that the wire takes, with finite sums', () => {
    fc.assert(
      fc.property(anyActs, fc.integer({ min: -100, max: 700 }), (acts, minute) => {
        const line = projectLine(aLineInput({ entries: entriesOfActs(acts) }));
        expect(loomLineSchema.safeParse(line).error).toBeUndefined();
        const totals = lineTotals(line, at(minute));
        const numbers = Object.values(totals).filter((value) => typeof value === 'number');
        expect(numbers.every(Number.isFinite)).toBe(true);
        expect(totals.measuredMinutes).toBeGreaterThanOrEqual(
          totals.plannedMinutes + totals.shedStopMinutes - totals.estimatedMinutes - 1e-9,
        );
      }),
      { numRuns: 300 },
    );
  });
});

describe('a shift split anywhere', () => {
  const loomVersions = [aLoomVersion(), aLoomVersion({ id: 'faster', effectiveAt: at(200), ppm: 200 })];
  const part = (name: string, from: number, until: number, meal: Shift['meal']) =>
    aShift({
      key: `shed-1:2026-06-01:${name}`,
      patternId: name,
      startsAt: at(from),
      endsAt: at(until),
      meal,
    });

  function totalsOf(
    shift: Shift,
    neighbours: { previous: Shift | null; next: Shift | null },
    entries: BookEntry[],
  ) {
    const line = projectLine(aLineInput({ shift, ...neighbours, entries, loomVersions }));
    return { line, totals: lineTotals(line, at(2000)) };
  }

  it('adds up to the whole', () => {
    const meals = fc.option(
      fc.record({ from: fc.integer({ min: 1, max: 400 }), looms: fc.constantFrom('stopped', 'running') }),
    );
    fc.assert(
      fc.property(stopActs, fc.integer({ min: 1, max: 479 }), meals, (acts, cut, break_) => {
        const meal = break_ && {
          startsAt: at(break_.from),
          endsAt: at(break_.from + 30),
          looms: break_.looms as 'stopped' | 'running',
        };
        const [whole, early, late] = [
          part('whole', 0, 480, meal),
          part('early', 0, cut, meal),
          part('late', cut, 480, meal),
        ];
        const stops = entriesOfActs(acts);
        const { book } = entryBuilder(5000);
        const readings = [
          book('reading', 0, { boundary: 'start', value: 900_000, shiftKey: early.key }),
          book('reading', cut, { boundary: 'end', value: (900_000 + cut * 170) % 1e6, shiftKey: early.key }),
          book('reading', 480, { boundary: 'end', value: 50_000, shiftKey: late.key }),
          book('reading', 0, { boundary: 'start', value: 900_000, shiftKey: whole.key }),
          book('reading', 480, { boundary: 'end', value: 50_000, shiftKey: whole.key }),
        ];
        const entries = [...stops, ...readings];
        const all = totalsOf(whole, { previous: null, next: null }, entries);
        const first = totalsOf(early, { previous: null, next: late }, entries);
        const second = totalsOf(late, { previous: early, next: null }, entries);
        expect(all.line.picks).toBe(150_000);
        const sum = sumTotals([first.totals, second.totals]);
        // How many picks fell to which speed is estimated in the whole, and read where it is split.
        expectClose({ ...sum, weavingMinutes: 0 }, { ...all.totals, weavingMinutes: 0 });
      }),
      { numRuns: 300 },
    );
  });
});

function expectClose(actual: LineTotals, expected: LineTotals): void {
  const { minutesByCause: actualCauses, ...actualSums } = actual;
  const { minutesByCause: expectedCauses, ...expectedSums } = expected;
  const close = (value: number) => expect.closeTo(value, 6) as number;
  const closeRecord = (record: Record<string, number | null>) =>
    Object.fromEntries(
      Object.entries(record).map(([key, value]) => [key, value === null ? null : close(value)]),
    );
  expect(actualSums).toEqual(closeRecord(expectedSums));
  expect(Object.keys(actualCauses)).toEqual(Object.keys(expectedCauses));
  for (const [cause, minutes] of Object.entries(expectedCauses))
    expect({ cause, ...actualCauses[cause] }).toEqual({ cause, ...closeRecord(minutes) });
}
