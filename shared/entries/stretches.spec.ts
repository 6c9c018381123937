import { describe, expect, it } from 'vitest';
import { lineTotals } from '../figures/loom-line.js';
import {
  aClothVersion,
  aFitting,
  aLineInput,
  aLoomVersion,
  aShift,
  at,
  entryBuilder,
  LOOM_ID,
  someCauses,
  uuidV7,
} from '../testing/builders.js';
import type { LineInput } from './projection-input.js';
import { projectLine } from './projection.js';

const CLOTHS = [aClothVersion(), aClothVersion({ clothId: 'cloth-2', ends: 2000 })];
const CHANGED = [
  aFitting(),
  aFitting({ id: uuidV7(7), effectiveAt: at(300), warpId: 'warp-2', clothId: 'cloth-2' }),
];

function lineOf(changes: Partial<LineInput>) {
  return projectLine(aLineInput({ clothVersions: CLOTHS, ...changes }));
}
const minutesOf = (line: ReturnType<typeof lineOf>) =>
  line.stretches.map((one) => (one.from - at(0)) / 60_000);
const picksOf = (line: ReturnType<typeof lineOf>) => line.stretches.map((one) => [one.picks, one.picksBy]);

describe('a line without changes', () => {
  it('is one stretch, with what is in force at its start', () => {
    const line = lineOf({});
    expect(line.stretches).toEqual([
      {
        from: at(0),
        until: at(480),
        loomVersionId: 'loom-1.1',
        ppm: 180,
        clothId: 'cloth-1',
        clothVersionId: 'cloth-1.1',
        warpId: 'warp-1',
        ends: 3120,
        weaverId: null,
        picks: null,
        picksBy: 'none',
      },
    ]);
    expect(line.versionIds).toEqual(['cloth-1.1', 'loom-1.1']);
    expect(line.flags.map((flag) => flag.code)).toEqual(['no-start-reading', 'no-end-reading', 'no-weaver']);
  });

  it('says what is not known', () => {
    const line = lineOf({ loomVersions: [], fittings: [] });
    expect(line.stretches).toMatchObject([
      { ppm: null, loomVersionId: null, clothId: null, ends: null, warpId: null },
    ]);
    expect(line.flags.map((flag) => flag.code)).toEqual([
      'no-start-reading',
      'no-end-reading',
      'no-weaver',
      'no-cloth',
      'no-speed',
    ]);
    expect(line.versionIds).toEqual([]);
  });
});

describe('stretches', () => {
  it('part at a change of warp and cloth', () => {
    const line = lineOf({ fittings: CHANGED });
    expect(minutesOf(line)).toEqual([0, 300]);
    expect(line.stretches).toMatchObject([
      { until: at(300), warpId: 'warp-1', clothId: 'cloth-1', ends: 3120 },
      { until: at(480), warpId: 'warp-2', clothId: 'cloth-2', ends: 2000 },
    ]);
    expect(line.versionIds).toEqual(['cloth-1.1', 'cloth-2.1', 'loom-1.1']);
  });

  it('part at a change of warp alone, and not where the same is found again', () => {
    const again = [aFitting(), aFitting({ id: uuidV7(7), effectiveAt: at(300), how: 'as-found' })];
    expect(minutesOf(lineOf({ fittings: again }))).toEqual([0]);
    const knotted = [aFitting(), aFitting({ id: uuidV7(7), effectiveAt: at(300), warpId: 'warp-2' })];
    expect(minutesOf(lineOf({ fittings: knotted }))).toEqual([0, 300]);
  });

  it('part at a change of speed, and not of anything else of the loom', () => {
    const faster = [aLoomVersion(), aLoomVersion({ id: 'v2', effectiveAt: at(120), ppm: 200 })];
    expect(lineOf({ loomVersions: faster }).stretches).toMatchObject([
      { from: at(0), ppm: 180, loomVersionId: 'loom-1.1' },
      { from: at(120), ppm: 200, loomVersionId: 'v2' },
    ]);
    const rebuilt = [aLoomVersion(), aLoomVersion({ id: 'v2', effectiveAt: at(120), shuttles: 4 })];
    expect(minutesOf(lineOf({ loomVersions: rebuilt }))).toEqual([0]);
  });

  it('use what was in force at their start: a cloth’s new version waits for the next one', () => {
    const clothVersions = [
      ...CLOTHS,
      aClothVersion({ id: 'cloth-1.2', effectiveAt: at(60), ends: 3200 }),
      aClothVersion({ id: 'cloth-2.2', clothId: 'cloth-2', effectiveAt: at(290), ends: 2100 }),
    ];
    expect(lineOf({ clothVersions, fittings: CHANGED }).stretches.map((one) => one.ends)).toEqual([
      3120, 2100,
    ]);
  });

  it('take changes at the very start or end as none of this shift', () => {
    const fittings = [
      aFitting(),
      aFitting({ id: uuidV7(7), effectiveAt: at(0), clothId: 'cloth-2' }),
      aFitting({ id: uuidV7(8), effectiveAt: at(480), clothId: 'cloth-1' }),
    ];
    expect(lineOf({ fittings }).stretches).toMatchObject([
      { from: at(0), until: at(480), clothId: 'cloth-2' },
    ]);
  });

  it('know a warp change that is not among the fittings yet, and forget one that was voided', () => {
    const { book } = entryBuilder();
    const gaited = book('warp-change', 300, { how: 'gaiting', warpId: 'warp-2', clothId: 'cloth-2' });
    expect(minutesOf(lineOf({ entries: [gaited] }))).toEqual([0, 300]);
    const known = [aFitting(), aFitting({ id: gaited.entry.id, effectiveAt: at(300), clothId: 'cloth-2' })];
    const voided = book('void', 310, { targetId: gaited.entry.id });
    expect(minutesOf(lineOf({ entries: [gaited, voided], fittings: known }))).toEqual([0]);
  });
});

describe('picks of stretches', () => {
  function changing(changeMinute: number | null, value = 50_000) {
    const { book } = entryBuilder();
    return [
      book('reading', 0, { boundary: 'start', value: 0 }),
      ...(changeMinute === null ? [] : [book('reading', changeMinute, { boundary: 'change', value })]),
      book('reading', 480, { boundary: 'end', value: 72_000 }),
    ];
  }

  it('are by their own readings', () => {
    const line = lineOf({ entries: changing(300), fittings: CHANGED });
    expect(picksOf(line)).toEqual([
      [50_000, 'readings'],
      [22_000, 'readings'],
    ]);
    expect(line.flags.map((flag) => flag.code)).not.toContain('estimated-split');
    // ends of 3,120 and 2,000
    expect(lineTotals(line, at(480)).pickEnds).toBe(50_000 * 3120 + 22_000 * 2000);
  });

  it.each([295, 305])('a change reading serves a change within 5 min: minute %d', (minute) => {
    const line = lineOf({ entries: changing(minute), fittings: CHANGED });
    expect(minutesOf(line)).toEqual([0, 300]);
    expect(picksOf(line)[0]).toEqual([50_000, 'readings']);
  });

  it('or further away where the loom stood all the time in between', () => {
    const { book } = entryBuilder(50);
    const gaiting = book('stop', 200, { cause: 'gaiting', count: 1, until: at(300) });
    const line = lineOf({ entries: [...changing(210), gaiting], fittings: CHANGED });
    expect(minutesOf(line)).toEqual([0, 300]);
    expect(picksOf(line)).toEqual([
      [50_000, 'readings'],
      [22_000, 'readings'],
    ]);
    const open = book('standing', 250, { cause: 'gaiting' });
    expect(minutesOf(lineOf({ entries: [...changing(460), open], fittings: CHANGED }))).toEqual([0, 300]);
  });

  it('cut the line where the reading was taken, if it serves no change', () => {
    const line = lineOf({ entries: changing(200) });
    expect(minutesOf(line)).toEqual([0, 200]);
    expect(picksOf(line)).toEqual([
      [50_000, 'readings'],
      [22_000, 'readings'],
    ]);
  });

  it('take the nearest of two readings for one change', () => {
    const { book } = entryBuilder(50);
    const near = book('reading', 301, { boundary: 'change', value: 51_000 });
    const line = lineOf({ entries: [...changing(296), near], fittings: CHANGED });
    expect(minutesOf(line)).toEqual([0, 300]);
    expect(picksOf(line)[0]).toEqual([51_000, 'readings']);
    const far = book('reading', 304.5, { boundary: 'change', value: 52_000 });
    expect(picksOf(lineOf({ entries: [...changing(296), far], fittings: CHANGED }))[0]?.[0]).toBe(50_000);
  });

  it('without a reading are shared by running time, marked as estimated', () => {
    const { book } = entryBuilder(50);
    const entries = [
      ...changing(null),
      book('stop', 0, { cause: 'smash', count: 1, until: at(60) }), // first stretch runs 240 min
      book('stop', 310, { cause: 'warp-break', count: 10 }), // second runs 170: 180 less 10 by allowance
    ];
    const line = lineOf({ entries, fittings: CHANGED });
    expect(line.stretches[0]?.picks).toBeCloseTo((72_000 * 240) / 410, 6);
    expect(line.stretches[1]?.picks).toBeCloseTo((72_000 * 170) / 410, 6);
    expect(line.stretches.map((one) => one.picksBy)).toEqual(['shared', 'shared']);
    expect(line.stretches.reduce((sum, one) => sum + (one.picks ?? 0), 0)).toBe(72_000);
    expect(line.flags.map((flag) => flag.code)).toContain('estimated-split');
  });

  it('leave a meal with the looms stopped out of the running time', () => {
    const shift = aShift({ meal: { startsAt: at(240), endsAt: at(300), looms: 'stopped' } });
    const line = lineOf({ shift, entries: changing(null), fittings: CHANGED });
    expect(line.stretches[0]?.picks).toBeCloseTo((72_000 * 240) / 420, 6);
  });

  it('are read where the loom ran in one stretch only', () => {
    const { book } = entryBuilder(50);
    const stood = book('stop', 300, { cause: 'gaiting', count: 1, until: at(480) });
    const line = lineOf({ entries: [...changing(null), stood], fittings: CHANGED });
    expect(picksOf(line)).toEqual([
      [72_000, 'readings'],
      [0, 'readings'],
    ]);
    expect(line.flags.map((flag) => flag.code)).not.toContain('estimated-split');
  });

  it('are shared by length where by the log the loom never ran', () => {
    const { book } = entryBuilder(50);
    const stood = book('stop', 0, { cause: 'smash', count: 1, until: at(480) });
    const line = lineOf({ entries: [...changing(null), stood], fittings: CHANGED });
    expect(line.stretches.map((one) => one.picks)).toEqual([45_000, 27_000]);
  });

  it('share only between the readings around them', () => {
    const { book } = entryBuilder(50);
    const assigned = [
      book('assign', 0, { weaverId: 'ada', loomIds: [LOOM_ID] }),
      book('assign', 150, { weaverId: 'ben', loomIds: [LOOM_ID] }),
    ];
    const line = lineOf({ entries: [...changing(300), ...assigned], fittings: CHANGED });
    expect(line.stretches.map((one) => [one.weaverId, one.picks, one.picksBy])).toEqual([
      ['ada', 25_000, 'shared'],
      ['ben', 25_000, 'shared'],
      ['ben', 22_000, 'readings'],
    ]);
  });

  it('are shared over all where a change reading contradicts start and end, and the line says so', () => {
    const line = lineOf({ entries: changing(300, 80_000), fittings: CHANGED });
    expect(line.picks).toBe(72_000);
    expect(line.stretches.map((one) => one.picks)).toEqual([45_000, 27_000]);
    // 0 → 80,000 → (round the clock) 72,000 would be a whole clock more
    expect(line.flags).toContainEqual({ code: 'readings-disagree', value: 1_000_000 });
  });

  it('say so too where the clock cannot show the change reading', () => {
    const loomVersions = [aLoomVersion({ clock: { kind: 'continuous', unit: 1, digits: 5 } })];
    const line = lineOf({ entries: changing(300, 123_456), fittings: CHANGED, loomVersions });
    expect(line.flags).toContainEqual({ code: 'readings-disagree', value: 72_000 });
    expect(line.stretches.map((one) => one.picks)).toEqual([45_000, 27_000]);
  });

  it('start from 0 on a clock zeroed each shift', () => {
    const loomVersions = [aLoomVersion({ clock: { kind: 'zeroed-each-shift', unit: 1, digits: 5 } })];
    const [, change, end] = changing(300);
    const line = lineOf({ entries: [change!, end!], fittings: CHANGED, loomVersions });
    expect(line.stretches.map((one) => one.picks)).toEqual([50_000, 22_000]);
  });

  it.each([
    ['agreed', 'agreed'],
    ['from a sheet', 'sheet'],
  ] as const)('%s are shared by running time, marked as estimated', (_, by) => {
    const { book } = entryBuilder();
    const entry =
      by === 'agreed'
        ? book('decide', 500, { about: { agreedPicks: 64_000 } })
        : book('sheet', 500, { picks: 64_000, counts: {}, minutes: {} });
    const line = lineOf({ entries: [entry], fittings: CHANGED });
    expect(picksOf(line)).toEqual([
      [40_000, 'shared'],
      [24_000, 'shared'],
    ]);
    expect(line.picksBy).toBe(by);
    expect(line.flags).toContainEqual({ code: 'estimated-split' });
  });
});

describe('causes', () => {
  const later = {
    ...someCauses().find((one) => one.causeId === 'weft-break')!,
    id: 'weft-break.2',
    allowanceS: 90,
  };

  it('have the allowance in force at the start of their stretch', () => {
    const causeVersions = [...someCauses(), { ...later, effectiveAt: at(100) }];
    const { book } = entryBuilder();
    const taps = [200, 350].map((minute) => book('stop', minute, { cause: 'weft-break', count: 1 }));
    const line = lineOf({ entries: taps, causeVersions, fittings: CHANGED });
    expect(line.stops.map((one) => one.estimatedMs)).toEqual([30_000, 90_000]);
    expect(line.versionIds).toContain('weft-break.1');
    expect(line.versionIds).toContain('weft-break.2');
  });

  it('that the mill made during the stretch have the one they got, the first if need be', () => {
    const own = { ...later, causeId: 'own', id: 'own.1' };
    const { book } = entryBuilder();
    const taps = [50, 200].map((minute) => book('stop', minute, { cause: 'own', count: 1 }));
    const versions = [
      { ...own, effectiveAt: at(100) },
      { ...own, id: 'own.2', effectiveAt: at(150), allowanceS: 20 },
    ];
    const line = lineOf({ entries: taps, causeVersions: versions });
    expect(line.stops.map((one) => one.estimatedMs)).toEqual([90_000, 20_000]);
  });

  it('that are not known stop the loom all the same', () => {
    const { book } = entryBuilder();
    const line = lineOf({
      causeVersions: [],
      entries: [
        book('stop', 5, { cause: 'gone', count: 2 }),
        book('stop', 10, { cause: 'wait-tackler', count: 1, until: at(20) }),
      ],
    });
    expect(line.stops).toMatchObject([
      { group: 'loom', attendedBy: 'nobody', breakOf: null, count: 2, estimatedMs: 0 },
      { group: 'waiting', attendedBy: 'nobody' },
    ]);
  });
});
