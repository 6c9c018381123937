import type { LineStore } from './line-store.js';
import type { Shifts } from './which-shift.js';

/** Lines to be made again, gathered over a batch, so that each is projected once. */
export class LinesToWrite {
  private readonly byShift = new Map<string, Set<string>>();

  /** A shift is touched: it gets lines for all looms of its shed, if it has none. */
  touch(shiftKey: string): Set<string> {
    const looms = this.byShift.get(shiftKey) ?? new Set();
    this.byShift.set(shiftKey, looms);
    return looms;
  }

  add(shiftKey: string, loomId: string): void {
    this.touch(shiftKey).add(loomId);
  }

  /** The shift's lines are being written by another. */
  drop(shiftKey: string): void {
    this.byShift.delete(shiftKey);
  }

  async flush(lines: LineStore, shifts: Shifts): Promise<void> {
    for (const [shiftKey, looms] of this.byShift) {
      const shift = await shifts.named(shiftKey);
      if (!shift) continue;
      const shown = await lines.loomsOf(shift);
      const known = await lines.hasLines(shiftKey);
      await lines.write(shift, known ? shown.filter((loomId) => looms.has(loomId)) : shown);
    }
    this.byShift.clear();
  }
}
