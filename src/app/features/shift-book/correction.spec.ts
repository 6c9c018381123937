import { resolveCorrections } from '@shared/entries/corrections';
import type { BookEntry } from '@shared/entries/entry';
import { aShift, at, entryBuilder } from '@shared/testing/builders';
import { correctionOf, valuesOf, type CorrectionValues } from './correction';
import { sumsChanges } from './sums-words';
import { aRecord, aReference, aSay, recorded } from './testing/a-record';
import { whatIf } from './what-if';

const around = { timeZone: 'Europe/London', say: aSay(), shift: aShift() };

function correct(entry: BookEntry, typed: Partial<CorrectionValues>) {
  const [resolved] = resolveCorrections([entry]);
  if (!resolved) throw new Error('nothing to correct');
  return correctionOf(resolved, { ...valuesOf(resolved, around.say), ...typed }, around);
}

describe('a correction', () => {
  const { book } = entryBuilder();
  const stop = book('stop', 130, { cause: 'warp-break', count: 1 });
  const timed = book('stop', 200, { cause: 'cleaning', count: 1, until: at(212) });
  const reading = book('reading', 480, { boundary: 'end', value: 75_250 });

  it('changes nothing until something is typed', () => {
    expect(correct(stop, {})).toMatchObject({ change: {}, changes: [], problem: '' });
  });

  it('says before and after of what was typed, and nothing else', () => {
    const { change, changes } = correct(stop, { cause: 'weft-break', count: '3', at: '08:40' });
    expect(change).toEqual({ cause: 'weft-break', count: 3, at: at(160) });
    expect(changes).toEqual([
      { label: 'Time', before: '08:10', after: '08:40' },
      { label: 'Cause', before: 'Warp break', after: 'Weft break' },
      { label: 'Count', before: '1', after: '3' },
    ]);
  });

  it('takes an end after the beginning, or takes the end away', () => {
    expect(correct(stop, { until: '0825' }).change).toEqual({ until: at(145) });
    expect(correct(timed, { until: '' }).changes).toEqual([
      { label: 'Until', before: '09:32', after: 'no time of its own' },
    ]);
    expect(correct(timed, { until: '09:10' }).problem).toContain('The end lies before the beginning');
    expect(correct(timed, { at: '09:40' }).problem).toContain('The end lies before the beginning');
  });

  it.each([
    [stop, { count: '0' }, 'whole number'],
    [stop, { count: '1.5' }, 'whole number'],
    [stop, { at: '25:99' }, 'hours and minutes'],
    [reading, { value: '12a' }, 'digits alone'],
  ])('does not take %#', (entry, typed, why) => {
    expect(correct(entry, typed).problem).toContain(why);
  });

  it('shows what the line becomes before anything is saved, worked out as the book does', () => {
    const books = [book('reading', 0, { boundary: 'start', value: 1_000 }), stop, timed, reading];
    const record = aRecord(
      books.map((one) => recorded(one)),
      books,
    );
    const mill = { reference: aReference(), shifts: [] };
    const longer = correct(timed, { until: '09:50' });
    const found = whatIf(record, timed.entry.id, longer.amended, mill);
    // 12 min become 30; the picks stay what the clock says.
    expect(found && sumsChanges(found.before, found.after)).toEqual([
      { label: 'Minutes timed', before: '12 min', after: '30 min' },
    ]);
    const without = whatIf(record, stop.entry.id, null, mill);
    expect(without && sumsChanges(without.before, without.after)).toEqual([
      { label: 'Minutes estimated', before: '1 min', after: '0 min' },
      { label: 'Warp breaks', before: '1', after: '0' },
      { label: 'Stops', before: '2', after: '1' },
    ]);
    // 180 ppm × 480 min = 86,400 possible; 74,250 are 85.9%, 73,450 are 85.0%.
    const misread = whatIf(record, reading.entry.id, correct(reading, { value: '74450' }).amended, mill);
    expect(misread && sumsChanges(misread.before, misread.after)).toEqual([
      { label: 'Efficiency', before: '85.9%', after: '85.0%' },
      { label: 'Picks', before: '74,250', after: '73,450' },
    ]);
  });

  it('says nothing of a line that it would work out otherwise than the book', () => {
    const books = [stop];
    const record = aRecord(
      books.map((one) => recorded(one)),
      [...books, timed],
    );
    expect(whatIf(record, stop.entry.id, null, { reference: aReference(), shifts: [] })).toBeNull();
  });
});
