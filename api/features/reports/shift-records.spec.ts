import { v7 as uuid } from 'uuid';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, MINUTE, MONDAY } from '../../testing/test-entries.js';
import { runReport } from './run-report.js';

const AS_OF = MONDAY + 12 * HOUR;

describe('the record of a shift', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  const reading = (boundary: 'start' | 'end', value: number, loomId = 'n1') =>
    entry('reading', {
      loomId,
      shiftKey: EARLY,
      boundary,
      value,
      at: boundary === 'start' ? MONDAY : MONDAY + 8 * HOUR,
    });
  const stop = (hour: number, loomId = 'n1') =>
    entry('stop', { loomId, cause: 'warp-break', count: 1, at: MONDAY + hour * HOUR });
  const close = () => entry('close', { who: 'foreman', shiftKey: EARLY, at: MONDAY + 9 * HOUR });
  const accept = (targetId: string, batchId?: string) =>
    entry('accept', {
      who: 'foreman',
      targetId,
      reason: 'Her tablet had no signal',
      at: MONDAY + 10 * HOUR,
      ...(batchId === undefined ? {} : { batchId }),
    });
  const record = async (loomId = 'n1') => {
    const found = await runReport(book.data.manager, 'loomRecord', { shiftKey: EARLY, loomId, asOf: AS_OF });
    if (!found) throw new Error('no record');
    return found;
  };
  const held = async () => {
    const found = await runReport(book.data.manager, 'heldEntries', { shiftKey: EARLY, asOf: AS_OF });
    if (!found) throw new Error('no shift');
    return found;
  };
  const signed = async () => {
    const found = await runReport(book.data.manager, 'signedVersions', { shiftKey: EARLY });
    if (!found) throw new Error('no shift');
    return found;
  };

  it('tells a line whole: every entry with its author, corrections and taken-back ones too, of this loom alone', async () => {
    const [first, wrong] = [stop(1), stop(2)];
    await book.push([reading('start', 0), first, wrong, stop(3, 'n2'), reading('end', 900)]);
    const amend = entry('amend', {
      who: 'foreman',
      targetId: first.id,
      reason: 'Two, she says',
      change: { count: 2 },
      at: MONDAY + 9 * HOUR,
    });
    const gone = entry('void', {
      who: 'foreman',
      targetId: wrong.id,
      reason: 'Wrong loom',
      at: MONDAY + 9 * HOUR,
    });
    await book.push([amend, gone]);
    const { entries, loomNumber, line, figures, before, after } = await record();
    expect(loomNumber).toBe(1);
    expect([before?.loomNumber, after?.loomNumber]).toEqual([undefined, 2]);
    expect(entries.map(({ entry: said }) => said['kind'])).toEqual([
      'reading',
      'stop',
      'stop',
      'reading',
      'amend',
      'void',
    ]);
    expect(entries.map(({ by }) => by)).toEqual([
      'Wanda Test',
      'Wanda Test',
      'Wanda Test',
      'Wanda Test',
      'Fred Test',
      'Fred Test',
    ]);
    expect(line.stops.map(({ count }) => count)).toEqual([2]);
    expect(figures).toMatchObject({ picks: 90_000, warp: { count: 2 } });
  });

  it('says of a held entry what it would change, alone and with the others', async () => {
    await book.push([reading('start', 0), stop(1), reading('end', 900), close()]);
    const late = [stop(2), stop(3)];
    const note = entry('note', { loomId: 'n1', text: 'Late', at: MONDAY + 2 * HOUR });
    await book.push([...late, note]);
    const list = await held();
    expect(list.entries.map(({ entry: said }) => said['id'])).toEqual(late.map(({ id }) => id));
    const [one] = list.entries;
    expect(one).toMatchObject({
      by: 'Wanda Test',
      looms: [{ loomNumber: 1 }],
      holds: [{ reason: 'shift-closed', state: 'held', decidedBy: null }],
    });
    // One warp break more: its minute by allowance, nothing else.
    expect(one?.changes).toMatchObject([
      { before: { warpBreaks: 1, estimatedMinutes: 1 }, after: { warpBreaks: 2, estimatedMinutes: 2 } },
    ]);
    expect([list.before.figures.warp.count, list.after.figures.warp.count]).toEqual([1, 3]);
    // It only looked: nothing counts yet.
    expect((await book.lineRow(EARLY, 'n1')).warpBreaks).toBe(1);
  });

  it('shows what a held correction corrects', async () => {
    const first = stop(1);
    await book.push([reading('start', 0), first, reading('end', 900), close()]);
    const gone = entry('void', { targetId: first.id, reason: 'A slip', at: MONDAY + 2 * HOUR });
    await book.push([gone]);
    const [one] = (await held()).entries;
    expect(one?.target?.entry['id']).toBe(first.id);
    expect(one?.changes).toMatchObject([{ before: { warpBreaks: 1 }, after: { warpBreaks: 0 } }]);
  });

  it('keeps both signed versions, says what differs, and takes one act as one restatement', async () => {
    await book.push([reading('start', 0), stop(1), reading('end', 900), close()]);
    const late = [stop(2), stop(3), stop(4, 'n2')];
    await book.push(late);
    const act = uuid();
    await book.push(late.map(({ id }) => accept(id, act)));
    const { versions, reopened } = await signed();
    expect(versions.map(({ version, how, by, words }) => [version, how, by, words])).toEqual([
      [1, 'close', 'Fred Test', null],
      [2, 'accept', 'Fred Test', 'Her tablet had no signal'],
    ]);
    expect(versions.map(({ group }) => group.figures.warp.count)).toEqual([1, 3]);
    expect(versions[1]?.changed).toMatchObject([
      { loomNumber: 1, before: { warpBreaks: 1 }, after: { warpBreaks: 3 } },
      { loomNumber: 2, before: { stops: 0 }, after: { stops: 1 } },
    ]);
    expect(reopened).toEqual([]);
    expect((await held()).entries).toEqual([]);
    const { entries } = await record();
    const decided = entries.find(({ entry: said }) => said['id'] === late[0]?.id);
    expect(decided?.holds).toMatchObject([{ state: 'accepted', decidedBy: 'Fred Test' }]);
    expect(entries.filter(({ entry: said }) => said['kind'] === 'accept')).toHaveLength(2);
  });

  it('names who reopened it, and why', async () => {
    await book.push([stop(1), close()]);
    await book.push([
      entry('reopen', {
        who: 'foreman',
        shiftKey: EARLY,
        reason: 'A card was found',
        at: MONDAY + 9 * HOUR + MINUTE,
      }),
    ]);
    expect((await signed()).reopened).toEqual([
      { at: MONDAY + 9 * HOUR + MINUTE, by: 'Fred Test', reason: 'A card was found' },
    ]);
  });

  it('has no record of a loom that was not there', async () => {
    const asked = { shiftKey: EARLY, loomId: 's1', asOf: AS_OF };
    expect(await runReport(book.data.manager, 'loomRecord', asked)).toBeNull();
    expect(await runReport(book.data.manager, 'heldEntries', { shiftKey: 'none', asOf: AS_OF })).toBeNull();
  });
});
