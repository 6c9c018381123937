import { at, entryBuilder } from '@shared/testing/builders';
import { aFloorLoom } from './testing/a-floor-loom';

const call = { id: 'c', stepAt: null, state: 'stored' } as const;

describe('floorLoom', () => {
  it('gives the most that a running loom can have woven, and says so', () => {
    const { book } = entryBuilder();
    // 200 min in: a warp break tapped (60 s by allowance) and 19 min of cleaning, timed: 180 of 200 min.
    const loom = aFloorLoom(
      [
        book('stop', 10, { cause: 'warp-break', count: 1 }),
        book('stop', 30, { cause: 'cleaning', count: 1, until: at(49) }),
      ],
      200,
    );
    expect(loom.efficiency).toBeCloseTo(180 / 200, 10);
    expect(loom.atMost).toBe(true);
    expect(loom.standing).toBeNull();
    expect(loom.cloth).toBe('Glebe 42');
  });

  it('leaves shed stops and planned stands out of what is shown beside a weaver’s looms', () => {
    const { book } = entryBuilder();
    const loom = aFloorLoom(
      [
        book('shed-stop', 0, { cause: 'power', scope: { of: 'shed' }, until: at(60) }),
        book('stop', 60, { cause: 'cleaning', count: 1, until: at(75) }),
      ],
      120,
    );
    // 60 of 120 min were the power's; of the other 60 it was cleaned for 15.
    expect(loom.efficiency).toBeCloseTo(45 / 60, 10);
  });

  it('gives the efficiency by readings once the picks are read', () => {
    const { book } = entryBuilder();
    const loom = aFloorLoom(
      [
        book('reading', 0, { boundary: 'start', value: 1_000 }),
        book('reading', 480, { boundary: 'end', value: 1_000 + 64_800 }),
      ],
      479,
    );
    // 64,800 picks of 180 × 480 = 86,400.
    expect(loom.efficiency).toBe(0.75);
    expect(loom.atMost).toBe(false);
  });

  it('stands since the stop began, in its own words', () => {
    const { book } = entryBuilder();
    const loom = aFloorLoom([book('standing', 100, { cause: 'warp-break' })], 104);
    expect(loom.standing).toEqual({ words: 'Warp break', since: at(100), planned: false });
    expect(loom.at - (loom.standing?.since ?? 0)).toBe(4 * 60_000);
  });

  it('says who is waited for and who is at work', () => {
    const { book } = entryBuilder();
    const standing = book('standing', 100, { cause: 'picking' });
    const called = book('call', 105, { targetId: standing.entry.id });
    const waits = aFloorLoom([standing, called], 110, { call: { ...call, at: at(105), step: null } });
    expect(waits.standing?.words).toBe('Picking, waiting for tackler');
    expect(waits.call).toEqual({
      at: at(105),
      since: at(105),
      waits: true,
      words: 'Tackler called',
      unsent: false,
    });

    const arrived = book('attend', 112, { targetId: called.entry.id, step: 'arrive' });
    const works = aFloorLoom([standing, called, arrived], 115, {
      call: { ...call, at: at(105), step: 'arrive', stepAt: at(112) },
    });
    expect(works.standing).toEqual({ words: 'Picking, tackler at work', since: at(100), planned: false });
    expect(works.call).toMatchObject({ waits: false, words: 'Tackler there', since: at(112) });
  });

  it('does not say that a call is sent which only this device knows', () => {
    const loom = aFloorLoom([], 10, { call: { ...call, at: at(5), step: null, state: 'waiting' } });
    expect(loom.call).toMatchObject({ words: 'Call not sent', unsent: true });
  });

  it('runs again, and is not wanted by anybody while it stands by plan', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'no-order' });
    expect(aFloorLoom([stop], 20).standing).toMatchObject({ words: 'No order', planned: true });
    const resume = book('resume', 25, { targetId: stop.entry.id });
    expect(aFloorLoom([stop, resume], 30).standing).toBeNull();
  });

  it('tells its own stop rather than the shed’s', () => {
    const { book } = entryBuilder();
    const both = [
      book('standing', 10, { cause: 'smash' }),
      book('shed-stop', 20, { cause: 'power', scope: { of: 'shed' } }),
    ];
    expect(aFloorLoom(both, 30).standing?.words).toBe('Smash');
    expect(aFloorLoom(both.slice(1), 30).standing?.words).toBe('Power');
  });

  it('knows nothing of what began later than the moment it is shown for', () => {
    const { book } = entryBuilder();
    const loom = aFloorLoom([book('standing', 100, { cause: 'smash' })], 90);
    expect(loom.standing).toBeNull();
    expect(loom.lastStop).toBe(at(0));
  });

  it('remembers when it last stood: by a tap, by running again, or never in this shift', () => {
    const { book } = entryBuilder();
    expect(aFloorLoom([], 150).lastStop).toBe(at(0));
    const tap = book('stop', 20, { cause: 'weft-break', count: 1 });
    expect(aFloorLoom([tap], 150).lastStop).toBe(at(20));
    const timed = book('stop', 10, { cause: 'cleaning', count: 1, until: at(40) });
    expect(aFloorLoom([tap, timed], 150).lastStop).toBe(at(40));
  });
});
