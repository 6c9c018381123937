import { projectLine } from '@shared/entries/projection';
import { aLineInput, aShift, at, entryBuilder, SHIFT_START } from '@shared/testing/builders';
import type { BookEntry } from '@shared/entries/entry';
import { flagsOf, readingsOf, storyOf } from './line-story';
import { causeAt } from './testing/a-floor-loom';

const say = {
  causeName: (cause: string) => causeAt(cause)?.name ?? cause,
  /** Minutes into the shift are clear enough here. */
  time: (moment: number) => `+${(moment - SHIFT_START) / 60_000}`,
};
const story = (entries: BookEntry[], minutes: number) =>
  storyOf(projectLine(aLineInput({ entries })), at(minutes), say).map(({ time, words, more }) => [
    time,
    words,
    more,
  ]);

describe('storyOf', () => {
  it('tells taps and timed stops, the latest first, each with what its time is made of', () => {
    const { book } = entryBuilder();
    expect(
      story(
        [
          book('stop', 10, { cause: 'warp-break', count: 1 }),
          book('stop', 20, { cause: 'weft-break', count: 3 }),
          book('stop', 40, { cause: 'cleaning', count: 1, until: at(52), note: 'Under the sley' }),
        ],
        60,
      ),
    ).toEqual([
      ['+40–+52', 'Cleaning and oiling', '12 min; “Under the sley”'],
      ['+20', '3 × weft break', 'Tapped, counted as 1 min 30 s (estimated)'],
      ['+10', 'Warp break', 'Tapped, counted as 1 min (estimated)'],
    ]);
  });

  it('tells pern changes as one sentence, so that they do not hide the rest', () => {
    const { book } = entryBuilder();
    const perns = [5, 12, 19, 26].map((minute) => book('stop', minute, { cause: 'pern-change', count: 1 }));
    expect(story([...perns, book('stop', 20, { cause: 'smash', count: 1, until: at(23) })], 60)).toEqual([
      ['+26', '4 pern changes', 'The last of them then; counted as 1 min (estimated)'],
      ['+20–+23', 'Smash', '3 min'],
    ]);
  });

  it('tells a stop in progress and how long each waited for the other', () => {
    const { book } = entryBuilder();
    const standing = book('standing', 100, { cause: 'picking' });
    const called = book('call', 105, { targetId: standing.entry.id });
    const arrived = book('attend', 112, { targetId: called.entry.id, step: 'arrive' });
    expect(story([standing, called, arrived], 120)).toEqual([
      [
        'since +100',
        'Picking',
        'Stands for 20 min; 5 min picking; 7 min waiting for the tackler; 8 min picking',
      ],
    ]);
  });

  it('names a shed stop as one', () => {
    const { book } = entryBuilder();
    const power = book('shed-stop', 10, { cause: 'power', scope: { of: 'shed' }, until: at(15) });
    expect(story([power], 60)).toEqual([['+10–+15', 'Power, a shed stop', '5 min']]);
  });

  it('does not tell what began later than it is asked for', () => {
    const { book } = entryBuilder();
    expect(story([book('stop', 50, { cause: 'warp-break', count: 1 })], 49)).toEqual([]);
  });
});

describe('readingsOf', () => {
  it('gives each reading with its boundary, and both values of a clock that was reset', () => {
    const { book } = entryBuilder();
    const line = projectLine(
      aLineInput({
        entries: [
          book('reading', 1, { boundary: 'start', value: 45_321 }),
          book('reading', 200, { boundary: 'reset', value: 60_000, newValue: 0 }),
        ],
      }),
    );
    expect(readingsOf(line, say).map(({ words, time, value }) => [words, time, value])).toEqual([
      ['At the start', '+1', '45,321'],
      ['Clock reset', '+200', '60,000 → 0'],
    ]);
  });
});

describe('flagsOf', () => {
  const line = projectLine(aLineInput());
  it('asks for the end reading only when the shift is over', () => {
    const words = (moment: number) => flagsOf(line, moment).map((flag) => flag.words);
    expect(words(at(100))).toContain('no start reading');
    expect(words(at(100))).not.toContain('no end reading');
    expect(words(aShift().endsAt)).toContain('no end reading');
  });
});
