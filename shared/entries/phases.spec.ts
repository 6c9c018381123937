import { describe, expect, it } from 'vitest';
import { aLineInput, at, entryBuilder } from '../testing/builders.js';
import type { BookEntry } from './entry.js';
import { projectLine } from './projection.js';

/** Phases of the one timed stop, minutes after the shift's start. */
function phasesFrom(entries: readonly BookEntry[]) {
  const [stop] = projectLine(aLineInput({ entries })).stops.filter((one) => one.timed);
  const minutes = (moment: number | null) => (moment === null ? null : (moment - at(0)) / 60_000);
  return stop!.phases.map((one) => [one.cause, minutes(one.from), minutes(one.until)]);
}

function aCalledStop(cause = 'weft-fork') {
  const { book } = entryBuilder();
  const stop = book('standing', 10, { cause });
  const call = book('call', 15, { targetId: stop.entry.id });
  const attend = (minute: number, step: 'take' | 'arrive' | 'done' | 'leave') =>
    book('attend', minute, { targetId: call.entry.id, step });
  return { book, stop, call, attend, resume: book('resume', 60, { targetId: stop.entry.id }) };
}

describe('phases of a stop', () => {
  it('has one where nobody was called', () => {
    const { stop, resume } = aCalledStop();
    expect(phasesFrom([stop, resume])).toEqual([['weft-fork', 10, 60]]);
    expect(phasesFrom([stop])).toEqual([['weft-fork', 10, null]]);
  });

  it('runs until called for, waits for the tackler until he arrives, is his cause until Running', () => {
    const { stop, call, attend, resume, book } = aCalledStop();
    const repair = book('repair', 55, { targetId: call.entry.id, cause: 'picking' });
    const entries = [
      stop,
      call,
      attend(17, 'take'),
      attend(30, 'arrive'),
      attend(50, 'done'),
      repair,
      resume,
    ];
    expect(phasesFrom(entries)).toEqual([
      ['weft-fork', 10, 15],
      ['wait-tackler', 15, 30],
      ['picking', 30, 60],
    ]);
    expect(phasesFrom([...entries].reverse())).toEqual(phasesFrom(entries));
  });

  it('takes the latest repair, and the stop’s own cause while there is none', () => {
    const { stop, call, attend, resume, book } = aCalledStop();
    const arrive = attend(30, 'arrive');
    expect(phasesFrom([stop, call, arrive, resume]).at(-1)).toEqual(['weft-fork', 30, 60]);
    const first = book('repair', 40, { targetId: call.entry.id, cause: 'boxes' });
    const second = book('repair', 50, { targetId: call.entry.id, cause: 'checking' });
    expect(phasesFrom([stop, call, arrive, second, first, resume]).at(-1)).toEqual(['checking', 30, 60]);
  });

  it('calls it another loom fault where the stop itself was a wait', () => {
    const { stop, call, attend, resume } = aCalledStop('wait-tackler');
    expect(phasesFrom([stop, call, attend(30, 'arrive'), resume])).toEqual([
      ['wait-tackler', 10, 30],
      ['loom-other', 30, 60],
    ]);
  });

  it('waits until Running where nobody arrives, and again when he leaves', () => {
    const { stop, call, attend, resume } = aCalledStop();
    expect(phasesFrom([stop, call, resume]).at(-1)).toEqual(['wait-tackler', 15, 60]);
    const back = [attend(20, 'arrive'), attend(25, 'leave'), attend(40, 'arrive')];
    expect(phasesFrom([stop, call, ...back, resume])).toEqual([
      ['weft-fork', 10, 15],
      ['wait-tackler', 15, 20],
      ['weft-fork', 20, 25],
      ['wait-tackler', 25, 40],
      ['weft-fork', 40, 60],
    ]);
  });

  it('does not send the tackler away when he is called once more', () => {
    const { stop, call, attend, resume, book } = aCalledStop();
    const again = book('call', 35, { targetId: stop.entry.id });
    expect(phasesFrom([stop, call, attend(30, 'arrive'), again, resume])).toEqual([
      ['weft-fork', 10, 15],
      ['wait-tackler', 15, 30],
      ['weft-fork', 30, 60],
    ]);
  });

  it('waits from the beginning where the call came first, and ignores what came after Running', () => {
    const { stop, attend, resume, book } = aCalledStop();
    const early = book('call', 5, { targetId: stop.entry.id });
    const arrive = book('attend', 70, { targetId: early.entry.id, step: 'arrive' });
    expect(phasesFrom([stop, early, arrive, resume, attend(12, 'arrive')])).toEqual([
      ['wait-tackler', 10, 60],
    ]);
  });

  it('lets nobody arrive before the call, whatever two tablets’ clocks say', () => {
    const { stop, call, attend, resume } = aCalledStop();
    expect(phasesFrom([stop, call, attend(14, 'arrive'), resume])).toEqual([['weft-fork', 10, 60]]);
  });

  it('knows calls only that name the stop, and none that are voided', () => {
    const { stop, call, resume, book } = aCalledStop();
    const other = book('call', 12, {});
    const void_ = book('void', 20, { targetId: call.entry.id });
    expect(phasesFrom([stop, call, void_, other, resume])).toEqual([['weft-fork', 10, 60]]);
  });

  it.each(['maintenance', 'no-order', 'power'])('takes nothing from planned and shed stops: %s', (cause) => {
    const { stop, call, attend, resume } = aCalledStop(cause);
    expect(phasesFrom([stop, call, attend(30, 'arrive'), resume])).toEqual([[cause, 10, 60]]);
  });

  it('gives a shed stop none', () => {
    const { book } = entryBuilder();
    const stop = book('shed-stop', 10, { cause: 'power', scope: { of: 'shed' }, until: at(20) });
    const call = book('call', 12, { targetId: stop.entry.id });
    expect(phasesFrom([stop, call])).toEqual([['power', 10, 20]]);
  });
});
