import { Injectable, computed, inject } from '@angular/core';
import { inForceAt, type CauseVersion, type Cloth, type Loom, type Shift } from '@shared/contract/reference';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import { OfflineBook, type OpenCallView } from '../../offline/offline-book';
import { loomView, type CallView, type LoomView } from './loom-view';

/** A set may be taken over, or handed over, so long before a shift begins and after it ended. */
const EDGE = 60 * 60_000;

/** So long a loom that nothing touched is shown as it was, ms: less than the clock's own tick. */
const A_MOMENT = 5_000;

interface KnownView {
  readonly view: LoomView;
  readonly cloths: readonly Cloth[];
  readonly notSent: number;
  readonly now: number;
}

/** What the loomside screens show: my set with its lines, and what is still to read. */
@Injectable({ providedIn: 'root' })
export class LoomsideStore {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);

  private readonly views = new Map<string, KnownView>();

  readonly ready = this.book.ready;
  readonly shift = this.book.currentShift;
  readonly timeZone = computed(() => this.book.reference().mill.timeZone);
  readonly set = computed<readonly LoomView[]>(() => {
    const shift = this.shift();
    return shift ? this.book.mySet().flatMap((loom) => this.viewOf(loom, shift) ?? []) : [];
  });
  /** Looms whose start reading is missing. */
  readonly stillToRead = computed(() => this.set().filter((view) => view.needsStart));
  /** The next shift, where none runs or it begins within the hour. */
  readonly nextShift = computed<Shift | null>(() => {
    const now = this.clock.tick();
    return this.book.shifts().find((shift) => shift.startsAt > now) ?? null;
  });
  /** Shifts whose looms may be taken over now. */
  readonly takeOverShifts = computed<readonly Shift[]>(() => {
    const now = this.clock.tick();
    return this.book.shifts().filter((shift) => shift.endsAt > now && shift.startsAt <= now + EDGE);
  });
  /** A shift that ended within the hour and of which I have not read every loom. */
  readonly leftToHandOver = computed<Shift | null>(() => {
    const now = this.clock.tick();
    const ended = this.book
      .shifts()
      .filter((shift) => shift.endsAt <= now && shift.endsAt > now - EDGE)
      .at(-1);
    return ended && this.setIn(ended).some((view) => view.needsEnd) ? ended : null;
  });

  /** My looms in a shift. */
  setIn(shift: Shift): readonly LoomView[] {
    return this.book
      .setOf(this.session.person()?.id ?? null, shift)
      .flatMap((loom) => this.viewOf(loom, shift) ?? []);
  }

  loomById(id: string): Loom | null {
    return this.book.looms().find((loom) => loom.id === id) ?? null;
  }

  viewOf(loom: Loom, shift: Shift): LoomView | null {
    const line = this.book.lineOf(loom.id, shift);
    if (!line) return null;
    const { cloths } = this.book.reference();
    const notSent = this.book.notSent(loom.id);
    const now = this.clock.tick();
    // A tap on one loom is not felt on the others: what nothing touched stands as it was a moment ago. A call's steps
    // are entries of the loom, and its way to the book is counted in what is not sent.
    const key = `${shift.key} ${loom.id}`;
    const known = this.views.get(key);
    const young = known && now >= known.now && now - known.now < A_MOMENT;
    // A stop that had not begun then counts now.
    const begun = line.stops.some(({ from }) => known && from > known.now && from <= now);
    if (young && !begun && known.view.line === line && known.cloths === cloths && known.notSent === notSent)
      return known.view;
    const view = loomView({
      loom,
      line,
      cloths,
      causeAt: (cause, at) => this.causeAt(cause, at),
      notSent,
      call: callView(this.book.openCall(loom.id, shift)),
      now,
    });
    this.views.set(key, { view, cloths, notSent, now });
    return view;
  }

  /** The loom's call in this shift that nobody has done with. */
  openCall(loom: Loom): CallView | null {
    const shift = this.shift();
    const call = shift && callView(this.book.openCall(loom.id, shift));
    return call && call.since >= shift.startsAt ? call : null;
  }

  causeAt(cause: string, at: number): CauseVersion | undefined {
    const versions = this.book.reference().causeVersions.filter((version) => version.causeId === cause);
    return inForceAt(versions, at) ?? versions[0];
  }

  causeName(cause: string): string {
    return this.causeAt(cause, this.clock.correctedNow())?.name ?? cause;
  }
}

function callView(call: OpenCallView | null): CallView | null {
  if (!call) return null;
  const { id, at: since, state, step, stepAt } = call;
  if (step) return { id, state: step === 'take' ? 'taken' : 'arrived', at: stepAt, since };
  if (state === 'waiting' || state === 'later') return { id, state: 'not-sent', at: since, since };
  return { id, state: state === 'stored' ? 'sent' : 'needs-look', at: since, since };
}
