import { describe, expect, it } from 'vitest';
import type { Shift } from '../contract/reference.js';
import { aLineInput, aShift, at, entryBuilder, LOOM_ID } from '../testing/builders.js';
import { projectLine } from './projection.js';

type Said = readonly [minute: number, weaver: string | null];

/** Who minds the loom from which minute on, by the line's stretches. */
function minded(said: readonly Said[], shift: Shift = aShift()) {
  const { book } = entryBuilder(1, shift);
  const entries = said.map(([minute, weaverId]) => book('assign', minute, { weaverId, loomIds: [LOOM_ID] }));
  const line = projectLine(aLineInput({ shift, entries }));
  expect(projectLine(aLineInput({ shift, entries: [...entries].reverse() }))).toEqual(line);
  return line.stretches.map((one): Said => [(one.from - at(0)) / 60_000, one.weaverId]);
}

describe('who minds a loom', () => {
  it('is nobody, unless said', () => {
    expect(minded([])).toEqual([[0, null]]);
  });

  it.each([0, 5])('is who takes over within 5 min of the start, from the start: minute %d', (minute) => {
    expect(minded([[minute, 'ada']])).toEqual([[0, 'ada']]);
  });

  it('is nobody before somebody takes over later', () => {
    expect(minded([[6, 'ada']])).toEqual([
      [0, null],
      [6, 'ada'],
    ]);
  });

  it('changes where another takes over', () => {
    expect(
      minded([
        [0, 'ada'],
        [200, 'ben'],
        [300, 'ben'],
      ]),
    ).toEqual([
      [0, 'ada'],
      [200, 'ben'],
    ]);
  });

  it('is as the foreman put down the evening before, or the morning after', () => {
    expect(minded([[-600, 'ada']])).toEqual([[0, 'ada']]);
    expect(
      minded([
        [0, 'ada'],
        [900, 'ben'],
      ]),
    ).toEqual([[0, 'ben']]);
  });

  it('is the later said of two for one moment', () => {
    expect(
      minded([
        [0, 'ada'],
        [3, 'ben'],
      ]),
    ).toEqual([[0, 'ben']]);
  });

  it.each([476, 480, 490])(
    'does not end with who leaves within 5 min of the end, or after: minute %d',
    (minute) => {
      expect(
        minded([
          [0, 'ada'],
          [minute, null],
        ]),
      ).toEqual([[0, 'ada']]);
    },
  );

  it('passes from one to the next without a gap within 5 min', () => {
    expect(
      minded([
        [0, 'ada'],
        [100, null],
        [105, 'ben'],
        [200, null],
        [206, 'cy'],
      ]),
    ).toEqual([
      [0, 'ada'],
      [100, 'ben'],
      [200, null],
      [206, 'cy'],
    ]);
  });

  it('leaves the assignments of other shifts and looms alone, and voided ones', () => {
    const { book } = entryBuilder();
    const mistake = book('assign', 0, { weaverId: 'cy', loomIds: [LOOM_ID] });
    const line = projectLine(
      aLineInput({
        entries: [
          book('assign', 0, { weaverId: 'ada', loomIds: [LOOM_ID], shiftKey: 'another' }),
          book('assign', 0, { weaverId: 'ben', loomIds: ['loom-2'] }),
          mistake,
          book('void', 1, { targetId: mistake.entry.id }),
        ],
      }),
    );
    expect(line.stretches.map((one) => one.weaverId)).toEqual([null]);
  });

  it('is who the paper sheet names, where nobody was assigned', () => {
    const { book } = entryBuilder();
    const sheet = book('sheet', 500, { picks: 1, counts: {}, minutes: {}, weaverId: 'ada' });
    expect(projectLine(aLineInput({ entries: [sheet] })).stretches[0]?.weaverId).toBe('ada');
    const assigned = book('assign', 0, { weaverId: 'ben', loomIds: [LOOM_ID] });
    expect(projectLine(aLineInput({ entries: [sheet, assigned] })).stretches[0]?.weaverId).toBe('ben');
  });
});

describe('who puts a loom down', () => {
  const assign = (minute: number, weaverId: string | null, by: string, first: number) =>
    entryBuilder(first).book('assign', minute, { weaverId, by, loomIds: [LOOM_ID] });
  const weavers = (entries: ReturnType<typeof assign>[]) =>
    projectLine(aLineInput({ entries })).stretches.map((one) => [(one.from - at(0)) / 60_000, one.weaverId]);
  const ada = assign(0, 'ada', 'ada', 1);
  const ben = assign(200, 'ben', 'ben', 2);

  it('after another has taken it over, puts nothing down', () => {
    const both = [
      [0, 'ada'],
      [200, 'ben'],
    ];
    expect(weavers([ada, ben, assign(206, null, 'ada', 3)])).toEqual(both);
    expect(weavers([ada, ben, assign(200, null, 'ada', 3)])).toEqual(both);
    expect(weavers([ada, ben, assign(206, null, 'ben', 3)])).toEqual([...both, [206, null]]);
  });

  it('may be the foreman, of whoever minds it', () => {
    expect(weavers([ada, ben, assign(300, null, 'foreman', 3)]).at(-1)).toEqual([300, null]);
  });
});

describe('a relief', () => {
  const meal = (looms: 'running' | 'stopped') =>
    aShift({ meal: { startsAt: at(240), endsAt: at(270), looms } });

  it.each([
    [240, 270],
    [235, 275],
    [250, 265],
  ])('during a meal with looms running does not split the line: %d to %d', (from, back) => {
    expect(
      minded(
        [
          [0, 'ada'],
          [from, 'relief'],
          [back, 'ada'],
        ],
        meal('running'),
      ),
    ).toEqual([[0, 'ada']]);
  });

  it('who stays on has the loom from the end of the meal', () => {
    expect(
      minded(
        [
          [0, 'ada'],
          [240, 'relief'],
        ],
        meal('running'),
      ),
    ).toEqual([
      [0, 'ada'],
      [270, 'relief'],
    ]);
  });

  it.each([
    ['outside the meal', 'running', 234, 276],
    ['with looms stopped', 'stopped', 240, 270],
  ] as const)('splits it %s', (_, looms, from, back) => {
    const said: Said[] = [
      [0, 'ada'],
      [from, 'relief'],
      [back, 'ada'],
    ];
    expect(minded(said, meal(looms))).toEqual(said);
  });
});
