import { sure } from './sure.js';
/** What happens when: a binary heap of moments (ms since 1970) and what to do then. */
export class Agenda {
  private readonly heap: { at: number; order: number; run: (at: number) => void }[] = [];
  private order = 0;

  schedule(at: number, run: (at: number) => void): void {
    const heap = this.heap;
    heap.push({ at, order: this.order++, run });
    for (let i = heap.length - 1; i > 0;) {
      const parent = (i - 1) >> 1;
      if (!this.before(i, parent)) break;
      this.swap(i, parent);
      i = parent;
    }
  }

  /** Runs all that happens before `end`, in order. */
  runUntil(end: number): void {
    for (let first = this.heap[0]; first && first.at < end; first = this.heap[0]) {
      this.takeFirst();
      first.run(first.at);
    }
  }

  /** The shed stands for `ms` (a meal, a weekend): everything that is still to come, comes that much later. */
  postpone(ms: number): void {
    for (const item of this.heap) item.at += ms;
  }

  private takeFirst(): void {
    const heap = this.heap;
    const last = heap.pop();
    if (!last || heap.length === 0) return;
    heap[0] = last;
    for (let i = 0; ;) {
      const left = 2 * i + 1;
      if (left >= heap.length) return;
      const right = left + 1;
      const child = right < heap.length && this.before(right, left) ? right : left;
      if (!this.before(child, i)) return;
      this.swap(child, i);
      i = child;
    }
  }

  /** Same moment: first come, first served, so that the same seed gives the same mill. */
  private before(i: number, j: number): boolean {
    const a = sure(this.heap[i]);
    const b = sure(this.heap[j]);
    return a.at < b.at || (a.at === b.at && a.order < b.order);
  }

  private swap(i: number, j: number): void {
    [this.heap[i], this.heap[j]] = [sure(this.heap[j]), sure(this.heap[i])];
  }
}
