import { at, entryBuilder, uuidV7, WEAVER_ID, LOOM_ID } from '@shared/testing/builders';
import { storyOf } from './loom-story';
import { aRecord, aSay, HELD, recorded } from './testing/a-record';

const say = aSay();

describe('the record of a line', () => {
  it('tells entries in order of time, with who and on which tablet', () => {
    const { book } = entryBuilder();
    const books = [
      book('stop', 130, { cause: 'warp-break', count: 2 }),
      book('assign', 0, { weaverId: WEAVER_ID, loomIds: [LOOM_ID] }),
      book('reading', 0, { boundary: 'start', value: 12_345 }),
      book('stop', 200, { cause: 'cleaning', count: 1, until: at(212), note: 'Lint' }),
    ];
    const story = storyOf(
      aRecord(
        books.map((one) => recorded(one)),
        books,
      ),
      say,
    );
    expect(story.map(({ time, words }) => `${time} ${words}`)).toEqual([
      '06:00 Nuala Doran minds loom 7',
      '06:00 Start reading 12,345',
      '08:10 2 × warp break',
      '09:20 Cleaning and oiling, until 09:32 (12 min); “Lint”',
    ]);
    expect(story[2]).toMatchObject({ who: 'Nuala Doran', device: 'Alley A', asLogged: '', voided: false });
  });

  it('shows each correction with before and after and its reason, and the entry as it was logged', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 130, { cause: 'warp-break', count: 1 });
    const amend = book('amend', 500, {
      targetId: stop.entry.id,
      reason: 'It was the weft',
      change: { cause: 'weft-break', at: at(140) },
    });
    const books = [stop, amend];
    const [one] = storyOf(
      aRecord(
        books.map((each) => recorded(each)),
        books,
      ),
      say,
    );
    expect(one).toMatchObject({ time: '08:20', words: 'Weft break', asLogged: '08:10 Warp break' });
    expect(one?.since).toMatchObject([
      {
        who: 'Freda Boon',
        words: 'Corrected',
        reason: 'It was the weft',
        waits: '',
        changes: [
          { label: 'Time', before: '08:10', after: '08:20' },
          { label: 'Cause', before: 'Warp break', after: 'Weft break' },
        ],
      },
    ]);
    expect(one?.basedOn).toBe(amend.entry.id);
  });

  it('keeps what was taken back, struck out, with why', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 130, { cause: 'warp-break', count: 1 });
    const gone = book('void', 140, { targetId: stop.entry.id, reason: 'Wrong loom' });
    const books = [stop, gone];
    const [one] = storyOf(
      aRecord(
        books.map((each) => recorded(each)),
        books,
      ),
      say,
    );
    expect(one).toMatchObject({ voided: true, words: 'Warp break' });
    expect(one?.since).toMatchObject([{ words: 'Taken back', reason: 'Wrong loom' }]);
  });

  it('tells a held entry with why it waits, and a held correction without applying it', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 130, { cause: 'warp-break', count: 1 });
    const late = book('stop', 300, { cause: 'weft-break', count: 1 });
    const gone = book('void', 500, { targetId: stop.entry.id, reason: 'A slip' });
    const record = aRecord([recorded(stop), recorded(late, HELD), recorded(gone, HELD)], [stop]);
    const [first, second] = storyOf(record, say);
    expect(first).toMatchObject({ voided: false, waits: '', basedOn: null });
    expect(first?.since).toMatchObject([{ words: 'Taken back', reason: 'A slip' }]);
    expect(first?.since[0]?.waits).toContain('The shift was closed before this came');
    expect(second?.waits).toContain('The shift was closed before this came');
    expect(second?.correctable).toBe(false);
  });

  it('says who accepted it and why', () => {
    const { book } = entryBuilder();
    const late = book('stop', 300, { cause: 'weft-break', count: 1 });
    const accept = book('accept', 500, { targetId: late.entry.id, reason: 'Spoke with her' });
    const [one] = storyOf(
      aRecord(
        [
          recorded(
            late,
            HELD.map((hold) => ({ ...hold, state: 'accepted', decidedBy: 'Freda Boon' })),
          ),
          recorded(accept),
        ],
        [late],
      ),
      say,
    );
    expect(one?.waits).toBe('');
    expect(one?.since).toMatchObject([{ words: 'Accepted', who: 'Freda Boon', reason: 'Spoke with her' }]);
  });

  it('leaves out what it cannot read rather than fail', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 130, { cause: 'warp-break', count: 1 });
    const newer = { ...recorded(stop), entry: { ...stop.entry, id: uuidV7(99), schema: 99 } };
    expect(storyOf(aRecord([recorded(stop), newer], [stop]), say)).toHaveLength(1);
  });
});
