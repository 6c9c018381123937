import type { HeldEntries } from '@shared/contract/shift-records';
import { entryBuilder } from '@shared/testing/builders';
import { closeChecks } from './close-checks';
import { aSheet, sheetEntries } from './testing/a-sheet';
import { recorded } from './testing/a-record';

const none = { entries: [] };

function held(count: number): Pick<HeldEntries, 'entries'> {
  const { book } = entryBuilder(500);
  return {
    entries: Array.from({ length: count }, () => ({
      ...recorded(book('stop', 60, { cause: 'warp-break', count: 1 })),
      target: null,
      looms: [],
      changes: [],
    })),
  };
}

describe('the check list before closing', () => {
  it('is empty for a whole shift', () => {
    const [whole] = sheetEntries();
    expect(closeChecks(aSheet(600, whole ? [whole] : []), none)).toEqual([]);
  });

  it('names missing readings, loom by loom, and what else is odd', () => {
    const checks = closeChecks(aSheet(), none);
    expect(checks.map(({ what, heading }) => [what, heading])).toEqual([
      ['readings', '2 loom lines lack a reading that holds'],
      ['look', '1 loom line is odd'],
    ]);
    expect(checks[0]?.looms).toMatchObject([
      { loomNumber: 2, why: 'no end reading' },
      { loomNumber: 3, why: 'no start reading, no end reading' },
    ]);
    expect(checks.some((check) => check.blocks)).toBe(false);
  });

  it('names a stop that was never ended', () => {
    const { book } = entryBuilder();
    const open = [book('standing', 60, { cause: 'picking' })];
    expect(closeChecks(aSheet(600, [open]), none).map(({ heading }) => heading)).toContain(
      '1 loom has a stop that was never ended',
    );
  });

  it('blocks while held entries are not decided', () => {
    const [first] = closeChecks(aSheet(), held(2));
    expect(first).toMatchObject({ what: 'held', heading: '2 entries are held', blocks: true });
  });

  it('says that the shift still runs', () => {
    expect(closeChecks(aSheet(240), none).map(({ what }) => what)).toContain('runs');
    expect(closeChecks(aSheet(600), none).map(({ what }) => what)).not.toContain('runs');
  });
});
