import { Injectable, computed, inject } from '@angular/core';
import { inForceAt, type CauseVersion, type Loom, type Shift } from '@shared/contract/reference';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import { OfflineBook, type OpenCallView } from '../../offline/offline-book';
import { loomView, type CallView, type LoomView } from './loom-view';

/** A set may be taken over, or handed over, so long before a shift begins and after it ended. */
const EDGE = 60 * 60_000;

/** What the loomside screens show: my set with its lines, and what is still to read. */
@Injectable({ providedIn: 'root' })
export class LoomsideStore {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);

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
    return (
      line &&
      loomView({
        loom,
        line,
        cloths: this.book.reference().cloths,
        causeAt: (cause, at) => this.causeAt(cause, at),
        notSent: this.book.notSent(loom.id),
        call: callView(this.book.openCall(loom.id, shift)),
        now: this.clock.tick(),
      })
    );
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
