import { Injectable, inject } from '@angular/core';
import type { Fitting, Shift } from '@shared/contract/reference';
import type { ResolvedEntry } from '@shared/entries/corrections';
import { BookSignals } from './book-signals';
import type { OwnEntry } from './book-view';
import { OfflineBook } from './offline-book';
import { OfflineParts } from './offline-parts';
import { openCallsOf, unwrittenCallsOf, type TacklerCall, type UnwrittenCall } from './tackler-calls';

export interface TacklerCallView extends TacklerCall {
  /** How far the call has come on its way to the book. */
  readonly state: OwnEntry['state'];
  /** False: nobody else knows yet of the last word on it. */
  readonly stepSent: boolean;
}

interface Known {
  readonly version: number;
  readonly resolved: readonly ResolvedEntry[];
  readonly standing: ReadonlySet<string>;
}

/** The book for the tackler's screens: calls of a whole shed, looked up anew only for a loom that something touched. */
@Injectable({ providedIn: 'root' })
export class CallsBook {
  private readonly book = inject(OfflineBook);
  private readonly signals = inject(BookSignals);
  private readonly view = inject(OfflineParts).view;
  private readonly known = new Map<string, Known>();

  /** The loom's calls that nobody is done with, oldest first. Call it inside `computed`. */
  openCalls(loomId: string, shift: Shift): readonly TacklerCallView[] {
    const { resolved, standing } = this.loom(loomId, shift);
    const calls = openCallsOf(resolved, standing);
    if (calls.length > 0) this.signals.outboxChanges();
    return calls.map((call) => ({
      ...call,
      state: this.view.stateOf(call.id),
      stepSent: call.stepId === null || this.view.stateOf(call.stepId) === 'stored',
    }));
  }

  /** Calls of the loom that a person attended to since a moment and has written nothing about. */
  unwritten(loomId: string, shift: Shift, person: string, since: number): readonly UnwrittenCall[] {
    const { resolved, standing } = this.loom(loomId, shift);
    return unwrittenCallsOf(resolved, standing, person, since);
  }

  /** What lies in the loom by what this device knows, a change that was just logged here included. */
  fittingOf(loomId: string, shift: Shift): Pick<Fitting, 'warpId' | 'clothId' | 'effectiveAt'> | null {
    const line = this.book.lineOf(loomId, shift);
    const stretch = line?.stretches.filter(({ clothId }) => clothId !== null).at(-1);
    if (!stretch || stretch.clothId === null) return null;
    return { warpId: stretch.warpId, clothId: stretch.clothId, effectiveAt: stretch.from };
  }

  private loom(loomId: string, shift: Shift): Known {
    const version = this.signals.loomChanges(loomId);
    const key = `${shift.key} ${loomId}`;
    const before = this.known.get(key);
    if (before?.version === version) return before;
    const line = this.book.lineOf(loomId, shift);
    const open = line?.stops.filter((stop) => stop.timed && stop.until === null).map(({ id }) => id) ?? [];
    const loom = { version, resolved: this.view.resolvedOf(loomId, shift), standing: new Set(open) };
    this.known.set(key, loom);
    return loom;
  }
}
