import { weeksQueryOf, weeksViewOf } from './weeks-view';

/** A Wednesday. */
const TODAY = '2026-05-13';

describe('weeksViewOf', () => {
  it('is eight weeks of efficiency by loom up to this week where the address says nothing', () => {
    expect(weeksViewOf({}, TODAY)).toEqual({
      metric: 'efficiency',
      by: 'loom',
      run: 8,
      from: '2026-03-23',
      to: '2026-05-11',
      marked: null,
      sort: 'label',
      descending: false,
    });
  });

  it('reads what the address says', () => {
    const view = weeksViewOf(
      {
        metric: 'warp-breaks',
        by: 'row',
        weeks: '4',
        to: '2026-04-30',
        mark: '2,3',
        sort: 'change',
        dir: 'down',
      },
      TODAY,
    );
    expect(view).toMatchObject({
      metric: 'warp-breaks',
      by: 'row',
      run: 4,
      from: '2026-04-06',
      to: '2026-04-27',
    });
    expect(view).toMatchObject({ marked: ['2', '3'], sort: 'change', descending: true });
  });

  it('takes an address typed wrongly, or of a day to come, as it is at first', () => {
    const view = weeksViewOf(
      { metric: 'beauty', by: 'moon', weeks: '1000', to: '2026-02-30', mark: 'a,b,c,d,e,f' },
      TODAY,
    );
    expect(view).toMatchObject({ metric: 'efficiency', by: 'loom', run: 8, to: '2026-05-11' });
    expect(view.marked).toHaveLength(4);
    expect(weeksViewOf({ to: '2031-01-01' }, TODAY).to).toBe('2026-05-11');
  });

  it('begins weeks on Mondays: a Sunday belongs to the week before', () => {
    expect(weeksViewOf({ to: '2026-05-10' }, TODAY).to).toBe('2026-05-04');
    expect(weeksViewOf({ to: '2026-05-11' }, TODAY).to).toBe('2026-05-11');
  });
});

describe('weeksQueryOf', () => {
  it('asks the book for the Mondays, inclusive; metric and order are the page’s own', () => {
    const view = weeksViewOf({ weeks: '4', metric: 'weft-breaks', sort: 'cloth' }, TODAY);
    expect(weeksQueryOf(view, 'shed-1')).toEqual({
      shedId: 'shed-1',
      by: 'loom',
      from: '2026-04-20',
      to: '2026-05-11',
    });
    expect(weeksQueryOf(view, null)).toBeNull();
  });
});
