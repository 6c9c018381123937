import type { Shift } from '../../shared/contract/reference.js';
import type { Shed } from './shed.js';
import { HOUR, MINUTE, SECOND, type LoomState } from './weaving.js';
import { sure } from './sure.js';

/**
 * What people get wrong, so that every screen has something true to show: a forgotten reading, two readings that
 * disagree, a slip put right by the foreman, a tap taken back, an entry that comes after the closing.
 */
export class Mishaps {
  private readonly kept = new Map<string, { readingId: string; value: number }>();

  /** `past`: shifts that are over, the last one not closed yet. */
  constructor(
    private readonly past: readonly Shift[],
    private readonly current: Shift | null,
  ) {}

  private ago(n: number): string | null {
    return this.past[this.past.length - n]?.key ?? null;
  }

  forgetsReading(shiftKey: string, loom: number, boundary: 'start' | 'end'): boolean {
    // The shift before this one has no end reading of loom 9, and this one no start: the foreman has to chase it.
    if (loom === 9 && boundary === 'end') return shiftKey === this.ago(1);
    if (loom === 9 && boundary === 'start') return shiftKey === this.current?.key;
    if (loom === 14 && boundary === 'end') return shiftKey === this.ago(21);
    if (loom === 14 && boundary === 'start') return shiftKey === this.ago(20);
    return false;
  }

  /** What was typed in, for a clock that shows `value`. */
  misread(shiftKey: string, loom: LoomState, boundary: 'start' | 'end', value: number): number {
    const slip = Math.ceil(6_000 / loom.unit);
    // The start of this shift and the end of the last one disagree on loom 20: the foreman decides.
    if (loom.number === 20 && boundary === 'start' && shiftKey === this.current?.key)
      return (value + slip) % loom.clockModulus;
    if (loom.number === 3 && boundary === 'end' && shiftKey === this.ago(32))
      return (value + slip) % loom.clockModulus;
    return value;
  }

  /** Remembers the reading that the foreman will put right. */
  keep(shiftKey: string, loom: LoomState, readingId: string): void {
    if (loom.number === 3 && shiftKey === this.ago(32))
      this.kept.set(shiftKey, { readingId, value: Math.floor(loom.picks / loom.unit) % loom.clockModulus });
  }

  /** Between the shift's end and its closing. */
  afterShift(shed: Shed, shift: Shift): void {
    const slip = this.kept.get(shift.key);
    if (!slip) return;
    const at = shift.endsAt + 12 * MINUTE;
    shed.daybook.log(
      shed.crew.foreman,
      'demo-office',
      at,
      {
        kind: 'amend',
        at,
        targetId: slip.readingId,
        reason: 'Read off again with the weaver',
        change: { value: slip.value },
      },
      at + SECOND,
    );
  }

  duringShift(shed: Shed, shift: Shift): void {
    const weaverOf = (loom: LoomState): string => sure(shed.crew.weavers[loom.set]);
    const middle = shift.startsAt + 3 * HOUR;
    const loom = (number: number): LoomState => sure(shed.looms[number - 1]);
    if (shift.key === this.ago(2)) {
      const two = loom(2);
      const stop = { kind: 'stop', loomId: two.id, cause: 'weft-break', count: 1 } as const;
      const id = shed.say(weaverOf(two), two, middle, { ...stop, at: middle });
      const undone = middle + 6 * SECOND;
      shed.say(weaverOf(two), two, undone, {
        kind: 'void',
        at: undone,
        targetId: id,
        reason: 'Tapped twice',
      });
    }
    if (shift.key === this.ago(6)) {
      const six = loom(6);
      const id = shed.say(weaverOf(six), six, middle, {
        kind: 'stop',
        loomId: six.id,
        at: middle,
        cause: 'weft-break',
        count: 1,
      });
      const at = middle + 5 * MINUTE;
      shed.say(weaverOf(six), six, at, {
        kind: 'amend',
        at,
        targetId: id,
        reason: 'It was a mispick',
        change: { cause: 'mispick' },
      });
    }
    if (shift.key === this.ago(4)) this.late(shed, shift, loom(22), null);
    if (shift.key === this.ago(40))
      this.late(shed, shift, loom(10), 'The weaver has shown me the chalk mark on the loom');
  }

  /** A tap that stayed on a tablet until after the closing: held, and accepted by the foreman or not yet. */
  private late(shed: Shed, shift: Shift, loom: LoomState, accepted: string | null): void {
    const at = shift.startsAt + 4 * HOUR;
    const sentAt = shift.endsAt + 3 * HOUR;
    const id = shed.daybook.log(
      sure(shed.crew.weavers[loom.set]),
      shed.tabletOf(loom),
      at,
      { kind: 'stop', loomId: loom.id, at, cause: 'warp-break', count: 1 },
      sentAt,
    );
    if (!accepted) return;
    const decided = sentAt + 30 * MINUTE;
    shed.daybook.log(
      shed.crew.foreman,
      'demo-office',
      decided,
      { kind: 'accept', at: decided, targetId: id, reason: accepted },
      decided + SECOND,
    );
  }
}
