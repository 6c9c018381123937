import type { BookEntry } from '@shared/entries/entry';
import { projectLine } from '@shared/entries/projection';
import { aLineInput, entryBuilder } from '@shared/testing/builders';
import { remediesOf } from './remedies';

function remedies(entries: readonly BookEntry[]) {
  return remediesOf(projectLine(aLineInput({ entries })), false);
}

describe('remedies', () => {
  it('stand beside every flag', () => {
    const { book } = entryBuilder();
    const found = remedies([book('standing', 60, { cause: 'picking' })]);
    expect(found.map(({ flag }) => flag)).toEqual([
      'no start reading',
      'no end reading',
      'a stop was never ended',
      'no weaver',
    ]);
    for (const { words } of found) expect(words).not.toBe('');
  });

  it('lead from a stop that was never ended to that stop', () => {
    const { book } = entryBuilder();
    const stands = book('standing', 60, { cause: 'picking' });
    const open = remedies([stands]).find(({ flag }) => flag === 'a stop was never ended');
    expect(open?.acts).toEqual([
      { label: 'End this stop', act: { do: 'correct', entryId: stands.entry.id } },
    ]);
  });

  it('lead from readings that disagree to the boundary at which they do', () => {
    const { book } = entryBuilder();
    const found = remedies([
      book('reading', 0, { boundary: 'start', value: 1_000 }),
      book('reading', 478, { boundary: 'end', value: 75_250 }),
      book('reading', 480, { boundary: 'end', value: 77_250 }),
    ]);
    expect(found[0]?.flag).toBe('readings disagree by 2,000 picks');
    expect(found[0]?.acts).toEqual([
      { label: 'Decide the end reading', act: { do: 'decide', boundary: 'end' } },
      { label: 'Agree the picks', act: { do: 'add', what: 'picks' } },
    ]);
  });
});
