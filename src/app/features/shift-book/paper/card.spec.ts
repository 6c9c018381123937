import { shippedCauses } from '@shared/entries/causes';
import type { PersonCard } from '@shared/contract/reference';
import { cardText, checkCard, EMPTY_CARD, withTyped, type CardPlace, type CardText } from './card';

const PLACE: CardPlace = {
  loomId: 'loom-7',
  loomNumber: 7,
  clock: { kind: 'continuous', unit: 100, digits: 5 },
  ppm: 200,
  minutes: 480,
  startInBook: 1_000,
  endInBook: null,
};
const person = (id: string, name: string, worksNumber: string, role: 'weaver' | 'foreman'): PersonCard => ({
  id,
  name,
  shortName: name.split(' ')[0] ?? name,
  worksNumber,
  roles: [role],
  usualSet: [],
});
const around = {
  causes: shippedCauses(0).map((cause, i) => ({ number: i + 1, cause })),
  people: [
    person('nuala', 'Nuala Doran', '101', 'weaver'),
    person('nora', 'Nora Vale', '102', 'weaver'),
    person('norris', 'Norris Pike', '301', 'foreman'),
  ],
};
const check = (text: Partial<CardText>, place: Partial<CardPlace> = {}) =>
  checkCard({ ...EMPTY_CARD, ...text }, { ...PLACE, ...place }, around);

describe('a card as it is typed', () => {
  it('says picks and efficiency while it is typed: 700 steps of 100 against 200 × 480', () => {
    const found = check({ end: '1700', warp: '2', perns: '90' });
    expect(found).toMatchObject({ picks: 70_000, problems: {}, question: '' });
    expect(found.efficiency).toBeCloseTo(70_000 / 96_000, 12);
    expect(found.said).toEqual({
      end: 1_700,
      counts: { 'warp-break': 2, 'pern-change': 90 },
      minutes: {},
    });
  });

  it('rolls the clock over', () => {
    expect(check({ start: '99900', end: '500' }, { startInBook: null }).picks).toBe(60_000);
  });

  it('says nothing of what is not typed, and 0 of what is typed as 0', () => {
    expect(check({ end: '1700' }).said?.counts).toEqual({});
    expect(check({ end: '1700', weft: '0' }).said?.counts).toEqual({ 'weft-break': 0 });
  });

  it.each([
    [{ end: '123456' }, 'end', 'This clock has 5 digits'],
    [{ end: '-5' }, 'end', 'below nought'],
    [{ end: '17o0' }, 'end', 'not a reading'],
    [{ end: '1700', warp: '2.5' }, 'warp', 'no whole number'],
    [{ end: '1700', perns: '99999' }, 'perns', 'that can be'],
    [{ end: '1700', others: 'gait 500' }, 'others', 'longer than the shift’s 480'],
    [{ end: '1700', weaver: '999' }, 'weaver', 'Nobody has'],
    [{ end: '1700', weaver: 'n' }, 'weaver', 'Type more of the name'],
  ] as const)('answers what cannot be on the spot: %o', (text, field, words) => {
    const found = check(text);
    expect(found.problems[field]).toContain(words);
    expect(found.said).toBeNull();
  });

  it('asks about more than the loom can weave, and takes it once it is kept', () => {
    const asked = check({ end: '2600' });
    expect(asked.question).toContain('More than this loom can weave: 96,000');
    expect(asked.efficiency).toBeNull();
    expect(asked.said).toBeNull();
    expect(check({ end: '2600', kept: true }).said?.end).toBe(2_600);
  });

  it('asks where picks alone are more than the loom can weave', () => {
    expect(check({ picks: '70000' })).toMatchObject({ picks: 70_000, question: '' });
    expect(check({ picks: '170,000' }).question).toContain('the card says 170,000');
  });

  it('asks where the card and the book disagree', () => {
    expect(check({ start: '1010', end: '1700' }).question).toContain('The book has 1,000 at the start');
    expect(check({ end: '1700' }, { endInBook: 1_720 }).question).toContain('The book has 1,720 at the end');
    expect(check({ start: '1000', end: '1700' }).question).toBe('');
  });

  it('finds the weaver by works number, by name, and a weaver before others', () => {
    expect(check({ weaver: '102' })).toMatchObject({ weaverName: 'Nora Vale', said: { weaverId: 'nora' } });
    expect(check({ weaver: 'nual' }).weaverName).toBe('Nuala Doran');
    expect(check({ weaver: 'nor' }).weaverName).toBe('Nora Vale');
    expect(check({ weaver: '301' }).weaverName).toBe('Norris Pike');
  });

  it('keeps every cell of a quick hand, though the page shows the row as it was before', () => {
    const shown = { ...EMPTY_CARD, end: '17' };
    const end = withTyped({}, 'loom-7', shown, { end: '1700' });
    const warp = withTyped(end, 'loom-7', shown, { warp: '1' });
    const weft = withTyped(warp, 'loom-7', shown, { weft: '2' });
    expect(weft['loom-7']).toEqual({ ...EMPTY_CARD, end: '1700', warp: '1', weft: '2' });
  });

  it('has nothing to put in while it is blank', () => {
    expect(check({})).toMatchObject({ blank: true, said: null, question: '' });
    expect(check({ end: '  ' }).blank).toBe(true);
  });

  it('comes back from the book as it was typed', () => {
    const text = { ...EMPTY_CARD, end: '1700', warp: '2', perns: '90', weaver: '101', others: '5*12' };
    const { said } = checkCard(text, PLACE, around);
    expect(said && cardText(said, around)).toEqual({ ...text, kept: true });
  });
});
