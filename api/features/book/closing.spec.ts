import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { ShiftRow } from '../../database/entities/index.js';
import { LoomVersionRow } from '../../database/entities/index.js';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, LATE, MINUTE, MONDAY } from '../../testing/test-entries.js';

interface Signed {
  version: number;
  totals: string;
  entryId: string;
  by: string;
}

describe('closing a shift', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  const reading = (boundary: 'start' | 'end', value: number, at: number, shiftKey = EARLY) =>
    entry('reading', { loomId: 'n1', shiftKey, boundary, value, at });
  const stop = (at = MONDAY + HOUR) => entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at });
  const close = (shiftKey = EARLY) => entry('close', { who: 'foreman', shiftKey, at: MONDAY + 9 * HOUR });
  const reopen = () =>
    entry('reopen', { who: 'foreman', shiftKey: EARLY, reason: 'A sheet was found', at: MONDAY + 10 * HOUR });
  const decide = (kind: 'accept' | 'refuse', targetId: string) =>
    entry(kind, { who: 'foreman', targetId, reason: 'Spoke with her', at: MONDAY + 11 * HOUR });
  const shift = [reading('start', 0, MONDAY), stop(), reading('end', 900, MONDAY + 8 * HOUR)];
  const signed = () =>
    book.data.query<Signed[]>(`SELECT * FROM "signed_totals" ORDER BY "shiftKey", "version"`);
  const breaksSigned = async () =>
    (await signed()).map(
      ({ totals }) =>
        (JSON.parse(totals) as { group: { figures: { warp: { count: number } } } }).group.figures.warp.count,
    );
  const breaks = async () => (await book.lineRow(EARLY, 'n1')).warpBreaks;
  const stateOf = async (key: string) =>
    (await book.data.query<ShiftRow[]>(`SELECT * FROM "shift" WHERE "key" = ?`, [key]))[0]?.state;

  it('signs the totals of every loom of the shed, and closes once', async () => {
    await book.push(shift);
    const [first] = await book.push([close()]);
    expect(first?.result).toBe('stored');
    expect(await stateOf(EARLY)).toBe('closed');
    await book.push([close()]);
    const [only, ...others] = await signed();
    expect(others).toEqual([]);
    expect(only).toMatchObject({ version: 1, by: 'fred' });
    const totals = JSON.parse(only?.totals ?? '') as {
      lines: { loomId: string; totals: { picks: number } }[];
    };
    expect(totals.lines.map((line) => line.loomId)).toEqual(['n1', 'n2', 'n3', 'n4']);
    expect(totals.lines[0]?.totals.picks).toBe(90_000);
    expect((await book.line(EARLY, 'n1')).shift.state).toBe('closed');
  });

  it('counts what stands before the close in the same request, and holds what stands after it', async () => {
    const [, , , , late] = await book.push([...shift, close(), stop()]);
    expect(late).toMatchObject({ result: 'held', hold: 'shift-closed', shiftKey: EARLY });
    expect(await breaks()).toBe(1);
  });

  it('holds what comes late; accepted, it is signed again beside the first version', async () => {
    await book.push([...shift, close()]);
    const late = stop(MONDAY + 3 * HOUR);
    expect((await book.push([late]))[0]).toMatchObject({ result: 'held', hold: 'shift-closed' });
    expect((await book.push([late]))[0]).toMatchObject({ result: 'duplicate', hold: 'shift-closed' });
    expect(await breaks()).toBe(1);
    const accept = decide('accept', late.id);
    expect((await book.push([accept]))[0]?.result).toBe('stored');
    expect(await breaks()).toBe(2);
    expect(await breaksSigned()).toEqual([1, 2]);
    expect((await signed())[1]?.entryId).toBe(accept.id);
    expect(await stateOf(EARLY)).toBe('closed');
    expect((await book.push([late]))[0]).toEqual(expect.not.objectContaining({ hold: 'shift-closed' }));
  });

  it('takes a weaver’s word on the picks for pay as it stands: a closed shift holds it not, and signs nothing anew', async () => {
    await book.push([...shift, close()]);
    const word = (word: 'confirmed' | 'queried', who: 'weaver' | 'foreman') =>
      entry('pay-word', {
        who,
        loomId: 'n1',
        shiftKey: EARLY,
        word,
        picks: 90_000,
        at: MONDAY + 9 * HOUR,
        schema: 2,
      });
    const results = await book.push([word('queried', 'weaver'), word('confirmed', 'weaver')]);
    expect(results.map(({ result, shiftKey }) => [result, shiftKey])).toEqual([
      ['stored', EARLY],
      ['stored', EARLY],
    ]);
    expect(await breaksSigned()).toEqual([1]);
    const [ofForeman] = await book.push([word('confirmed', 'foreman')]);
    expect(ofForeman).toMatchObject({ result: 'refused', code: 'entry-not-permitted' });
  });

  it('leaves what is refused on record and out of the figures, for good', async () => {
    await book.push([...shift, close()]);
    const late = stop(MONDAY + 3 * HOUR);
    await book.push([late, decide('refuse', late.id)]);
    expect(await breaksSigned()).toEqual([1]);
    await book.push([reopen(), stop(MONDAY + 4 * HOUR)]);
    expect(await breaks()).toBe(2);
    await book.push([decide('accept', late.id)]);
    expect(await breaks()).toBe(2);
  });

  it('reopens: entries count at once; what was held must be decided before it is closed again', async () => {
    await book.push([...shift, close()]);
    const late = stop(MONDAY + 3 * HOUR);
    await book.push([late, reopen(), stop(MONDAY + 4 * HOUR)]);
    expect(await stateOf(EARLY)).toBe('open');
    expect(await breaks()).toBe(2);
    expect((await book.push([close()]))[0]).toMatchObject({ result: 'refused', code: 'held-undecided' });
    await book.push([decide('accept', late.id)]);
    expect(await breaks()).toBe(3);
    expect((await book.push([close()]))[0]?.result).toBe('stored');
    expect(await breaksSigned()).toEqual([1, 3]);
  });

  it('takes decisions that come before what they decide', async () => {
    await book.push([...shift, close()]);
    const late = stop(MONDAY + 3 * HOUR);
    const [early] = await book.push([decide('accept', late.id)]);
    expect(early).toMatchObject({ result: 'held', hold: 'target-missing' });
    await book.push([late]);
    expect(await breaksSigned()).toEqual([1, 2]);
  });

  it('holds an entry for the closed shift only: in the open one it counts at once', async () => {
    const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + 7 * HOUR });
    await book.push([...shift, reading('end', 1_800, MONDAY + 16 * HOUR, LATE), close()]);
    expect((await book.push([stands]))[0]).toMatchObject({ result: 'held', hold: 'shift-closed' });
    expect((await book.lineRow(EARLY, 'n1')).measuredMinutes).toBe(0);
    expect((await book.lineRow(LATE, 'n1')).measuredMinutes).toBe(480);
    const resume = entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + 9 * HOUR });
    expect((await book.push([resume]))[0]).toMatchObject({ result: 'stored' });
    expect((await book.lineRow(LATE, 'n1')).measuredMinutes).toBe(60);
    await book.push([decide('accept', stands.id)]);
    expect((await book.lineRow(EARLY, 'n1')).measuredMinutes).toBe(60);
    expect((await book.lineRow(LATE, 'n1')).measuredMinutes).toBe(60);
  });

  it('needs no decision for what leaves the signed totals as they are', async () => {
    const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + 7 * HOUR });
    await book.push([...shift, stands, close()]);
    const resume = entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + 9 * HOUR });
    const sameReading = reading('start', 900, MONDAY + 8 * HOUR, LATE);
    const results = await book.push([resume, sameReading]);
    expect(results.map((one) => one.result)).toEqual(['stored', 'stored']);
    expect((await signed()).length).toBe(1);
    const other = reading('start', 950, MONDAY + 8 * HOUR + MINUTE, LATE);
    // It would make the closed shift's end doubtful: there it waits, in its own shift it counts.
    expect((await book.push([other]))[0]).toMatchObject({ result: 'held', hold: 'shift-closed' });
    expect((await book.lineRow(EARLY, 'n1')).picks).toBe(90_000);
  });

  it('keeps the versions that a shift was closed with, whatever is set later', async () => {
    await book.push([...shift, close()]);
    await book.data.getRepository(LoomVersionRow).insert({
      id: 'n1.2',
      loomId: 'n1',
      effectiveAt: MONDAY - HOUR,
      ppm: 100,
      reedSpaceCm: 190,
      clock: { kind: 'continuous', unit: 100, digits: 5 },
      shuttles: 1,
      battery: false,
    });
    const late = stop(MONDAY + 3 * HOUR);
    await book.push([late, decide('accept', late.id)]);
    expect((await book.lineRow(EARLY, 'n1')).possiblePicks).toBe(96_000);
    await book.push([reopen()]);
    expect((await book.lineRow(EARLY, 'n1')).possiblePicks).toBe(48_000);
  });

  it('carries out a held decision when it is accepted', async () => {
    await book.push(shift);
    const doubtful = entry('close', { who: 'foreman', shiftKey: EARLY, at: MONDAY + 400 * HOUR });
    expect((await book.push([doubtful]))[0]).toMatchObject({ result: 'held', hold: 'time-doubtful' });
    expect(await stateOf(EARLY)).toBe('open');
    await book.push([decide('accept', doubtful.id)]);
    expect(await stateOf(EARLY)).toBe('closed');
  });

  it('does not let a decision be voided: its opposite undoes it', async () => {
    const closing = close();
    await book.push([...shift, closing]);
    const undo = entry('void', { who: 'foreman', targetId: closing.id, reason: 'x', at: MONDAY + 9 * HOUR });
    expect((await book.push([undo]))[0]).toMatchObject({ result: 'refused', code: 'entry-malformed' });
  });
});
