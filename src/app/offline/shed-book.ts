import { Injectable, inject } from '@angular/core';
import { inForceAt, type Shift } from '@shared/contract/reference';
import { isKind, type ResolvedOf } from '@shared/entries/corrections';
import type { EntryOf } from '@shared/entries/entry';
import { BookSignals } from './book-signals';
import { OfflineBook, type OpenCallView } from './offline-book';
import { OfflineParts } from './offline-parts';
import { openCallOf, type OpenCall } from './open-call';

/** A paper card that counts. */
export interface CardInBook {
  readonly id: string;
  readonly entry: EntryOf<'sheet'>;
  /** How far it has come on its way to the book. */
  readonly state: OpenCallView['state'];
  /** What its correction is based on; null: nothing corrects it. */
  readonly basedOn: string | null;
}

export interface ShiftEvents {
  readonly notes: readonly ResolvedOf<'note'>[];
  readonly repairs: readonly ResolvedOf<'repair'>[];
}

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

  /** The cloth that is on a loom at a moment; null: the book does not know. */
  clothOn(loomId: string, at: number): string | null {
    this.signals.loomChanges(loomId);
    this.signals.outboxChanges();
    return inForceAt(this.view.fittingsOf(loomId), at)?.clothId ?? null;
  }

  /** The paper cards of a shift that count, by loom; of two for one loom the later. */
  cardsIn(shift: Shift): ReadonlyMap<string, CardInBook> {
    this.signals.outboxChanges();
    const found = new Map<string, CardInBook>();
    for (const { id: loomId } of this.book.looms()) {
      this.signals.loomChanges(loomId);
      const last = this.view
        .resolvedOf(loomId, shift)
        .filter((one): one is ResolvedOf<'sheet'> => isKind(one, 'sheet') && !one.voided)
        .filter((one) => one.entry.shiftKey === shift.key)
        .at(-1);
      if (!last) continue;
      const { id } = last.root.entry;
      const state = this.view.stateOf(id);
      found.set(loomId, { id, entry: last.entry, state, basedOn: last.latestCorrectionId });
    }
    return found;
  }

  /** What was noted and repaired in a shift, oldest first. */
  eventsOf(shift: Shift): ShiftEvents {
    this.signals.outboxChanges();
    for (const { id } of this.book.looms()) this.signals.loomChanges(id);
    return { notes: this.view.ofKind('note', shift), repairs: this.view.ofKind('repair', shift) };
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
