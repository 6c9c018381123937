import { at, entryBuilder } from '@shared/testing/builders';
import { floorTotals, picksInShort } from './floor-totals';
import { aFloorLoom } from './testing/a-floor-loom';

const waiting = (minutes: number, step: 'take' | 'arrive' | null = null) => ({
  id: `c${minutes}`,
  at: at(minutes),
  step,
  stepAt: null,
  state: 'stored' as const,
});

describe('floorTotals', () => {
  const { book } = entryBuilder();

  it('are ratios of sums, never means of the looms’ percentages', () => {
    // 100 min in at 180 ppm: one loom cleaned for 40 min, one read whole: 64,800 picks of 86,400 in 480 min.
    const cleaned = aFloorLoom([book('stop', 0, { cause: 'cleaning', count: 1, until: at(40) })], 100);
    const read = aFloorLoom(
      [
        book('reading', 0, { boundary: 'start', value: 0 }),
        book('reading', 480, { boundary: 'end', value: 64_800 }),
      ],
      100,
    );
    const totals = floorTotals([cleaned, read], at(100));
    // (60 × 180 + 64,800) / (100 × 180 + 86,400) = 75,600 / 104,400; a mean of 60% and 75% would be 67.5%.
    expect(totals.picks).toBeCloseTo(75_600, 6);
    expect(totals.efficiency).toBeCloseTo(75_600 / 104_400, 10);
    expect(totals.atMost).toBe(true);
  });

  it('count shed stops in: the shed’s efficiency is the loom efficiency', () => {
    const power = book('shed-stop', 0, { cause: 'power', scope: { of: 'shed' }, until: at(50) });
    expect(floorTotals([aFloorLoom([power], 100)], at(100)).efficiency).toBeCloseTo(0.5, 10);
  });

  it('count what runs, what stands by plan, who waits and since when', () => {
    const looms = [
      aFloorLoom([], 60),
      aFloorLoom([book('standing', 10, { cause: 'no-order' })], 60),
      aFloorLoom([book('standing', 20, { cause: 'picking' })], 60, { call: waiting(25) }),
      aFloorLoom([], 60, { call: waiting(15, 'take') }),
      aFloorLoom([book('standing', 5, { cause: 'picking' })], 60, { call: waiting(6, 'arrive') }),
    ];
    expect(floorTotals(looms, at(60))).toMatchObject({
      looms: 5,
      running: 2,
      planned: 1,
      callsWaiting: 2,
      longestCall: at(15),
    });
  });

  it('have no figure where there is no loom', () => {
    const totals = floorTotals([], at(60));
    expect(totals).toMatchObject({ looms: 0, running: 0, callsWaiting: 0, longestCall: null });
    expect(totals.efficiency).toEqual({ none: expect.any(String) });
  });
});

describe('picksInShort', () => {
  it('is no more exact than “at most” is worth', () => {
    expect(picksInShort(1_023_456)).toBe('1.02 M');
    expect(picksInShort(999_960)).toBe('1.00 M');
    expect(picksInShort(84_349)).toBe('84,300');
    expect(picksInShort(0)).toBe('0');
  });
});
