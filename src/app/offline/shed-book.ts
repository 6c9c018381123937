import { Injectable, inject } from '@angular/core';
import type { Shift } from '@shared/contract/reference';
import { BookSignals } from './book-signals';
import { OfflineBook, type OpenCallView } from './offline-book';
import { OfflineParts } from './offline-parts';
import { openCallOf, type OpenCall } from './open-call';

interface Known {
  readonly version: number;
  readonly call: OpenCall | null;
}

/**
 * The book for screens that show a whole shed: what would be looked up loom by loom, looked up once, or only for the
 * loom that something touched. Two hundred looms must not be felt at every entry of one of them.
 */
@Injectable({ providedIn: 'root' })
export class ShedBook {
  private readonly book = inject(OfflineBook);
  private readonly signals = inject(BookSignals);
  private readonly view = inject(OfflineParts).view;
  private readonly calls = new Map<string, Known>();

  /** Who minds which loom in a shift by what this device knows. Null: nobody; absent: not known. */
  weaversIn(shift: Shift): ReadonlyMap<string, string | null> {
    this.signals.assignChanges();
    const minded = this.view.assignments(shift);
    return new Map([...minded].map(([loomId, { weaverId }]) => [loomId, weaverId]));
  }

  /** The loom's call for the tackler that is not done with, and how far it has come. */
  callOf(loomId: string, shift: Shift): OpenCallView | null {
    const call = this.openCall(loomId, shift);
    if (!call) return null;
    this.signals.outboxChanges();
    return { ...call, state: this.view.stateOf(call.id) };
  }

  private openCall(loomId: string, shift: Shift): OpenCall | null {
    const version = this.signals.loomChanges(loomId);
    const key = `${shift.key} ${loomId}`;
    const known = this.calls.get(key);
    if (known?.version === version) return known.call;
    const line = this.book.lineOf(loomId, shift);
    const open = line?.stops.filter((stop) => stop.timed && stop.until === null).map(({ id }) => id) ?? [];
    const call = openCallOf(this.view.resolvedOf(loomId, shift), new Set(open));
    this.calls.set(key, { version, call });
    return call;
  }
}
