import { shippedCauses } from '@shared/entries/causes';
import { TAKEN } from './card';
import { otherStops, otherStopsText, type NumberedCause } from './other-stops';

const causes: readonly NumberedCause[] = shippedCauses(0).map((cause, i) => ({ number: i + 1, cause }));
const numberOf = (id: string): number => causes.find(({ cause }) => cause.causeId === id)?.number ?? 0;
const read = (text: string) => otherStops(text, causes, TAKEN);

describe('other stops of a card', () => {
  it('takes a number and minutes from the number pad', () => {
    const found = read(`${numberOf('gaiting')}*90`);
    expect(found).toMatchObject({ minutes: { gaiting: 90 }, counts: {}, problem: '' });
    expect(found.words).toBe('gaiting 90 min');
  });

  it.each([
    ['gait 90', { gaiting: 90 }],
    ['Gaiting 90 min', { gaiting: 90 }],
    ['gait=90 knot=12', { gaiting: 90, knotting: 12 }],
    [`${numberOf('gaiting')} 90 / ${numberOf('knotting')} 12`, { gaiting: 90, knotting: 12 }],
    [`${numberOf('gaiting')}*90 ${numberOf('knotting')}*12.5`, { gaiting: 90, knotting: 12.5 }],
    ['gait 30 gait 45', { gaiting: 75 }],
  ])('reads %s', (text, minutes) => {
    expect(read(text)).toMatchObject({ minutes, problem: '' });
  });

  it('takes a number of stops with an x', () => {
    expect(read('mispick 3x')).toMatchObject({ counts: { mispick: 3 }, minutes: {}, problem: '' });
  });

  it.each([
    ['90', 'type the cause, then its minutes'],
    ['gait', 'type the cause, then its minutes'],
    ['99*5', 'No cause has the number 99'],
    ['frob 5', 'No cause begins with “frob”'],
    ['sh 5', 'type more of it'],
    ['warp break 5x', 'a column of its own'],
    ['mispick 1.5x', 'a whole one'],
    ['gait 90 and', 'type the cause'],
  ])('says what it did not understand of %s', (text, words) => {
    const found = read(text);
    expect(found.problem).toContain(words);
    expect(found.minutes).toEqual({});
  });

  it('comes back as it would be typed', () => {
    const text = otherStopsText(
      { gaiting: 90, 'warp-break': 3 },
      { mispick: 2, 'weft-break': 9 },
      causes,
      TAKEN,
    );
    expect(read(text)).toMatchObject({ minutes: { gaiting: 90 }, counts: { mispick: 2 }, problem: '' });
  });
});
