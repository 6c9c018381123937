import { Injectable, computed, inject, type Signal } from '@angular/core';
import { inForceAt, type CauseVersion, type Loom, type Shift } from '@shared/contract/reference';
import type { LineStop } from '@shared/entries/loom-line';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import { CallsBook, type TacklerCallView } from '../../offline/calls-book';
import { LiveReach } from '../../offline/live-reach';
import { OfflineBook } from '../../offline/offline-book';

/** A call as the list shows it. Moments are corrected, ms since 1970. */
export interface CallRow extends TacklerCallView {
  readonly loom: Loom;
  readonly cloth: string;
  /** What it stands for, and since when; null: it was not logged as standing. */
  readonly stands: { readonly words: string; readonly since: number; readonly cause: string } | null;
  readonly minutes: number;
  /** Whoever is here has it. */
  readonly mine: boolean;
  /** The name of who has it, for whoever may see names; empty: nobody, or not to be told. */
  readonly taker: string;
  /** In the alley of whoever is here, where the mill says who serves which. */
  readonly ownAlley: boolean;
}

export interface UnwrittenRow {
  readonly id: string;
  readonly loom: Loom;
  readonly attendedAt: number;
}

/** How far back what is not written down is asked for: one's last shift, and the one before. */
const UNWRITTEN = 20 * 3_600_000;

/** The calls of the shed as this device knows them. Each loom is a signal of its own. */
@Injectable({ providedIn: 'root' })
export class CallsStore {
  private readonly book = inject(OfflineBook);
  private readonly calls = inject(CallsBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly reach = inject(LiveReach);
  private readonly byLoom = new Map<string, Signal<readonly CallRow[]>>();

  readonly live = this.reach.live;
  readonly knownUntil = this.reach.knownUntil;
  readonly catchingUp = this.reach.catchingUp;
  readonly timeZone = computed(() => this.book.reference().mill.timeZone);
  /** The shift that runs, or the last one that did: its calls still wait. */
  readonly shift = computed<Shift | null>(
    () =>
      this.book.currentShift() ??
      this.book
        .shifts()
        .filter(({ startsAt }) => startsAt <= this.clock.tick())
        .at(-1) ??
      null,
  );
  /** Whoever has waited longest first. */
  readonly all = computed<readonly CallRow[]>(() =>
    this.book
      .looms()
      .flatMap((loom) => this.ofLoom(loom)())
      .map((row) => ({ ...row, minutes: Math.max(0, Math.floor((this.clock.tick() - row.at) / 60_000)) }))
      .sort((a, b) => a.at - b.at),
  );
  readonly waiting = computed(() => this.all().filter(({ step }) => step === null));
  readonly mine = computed(() => this.all().filter(({ step, mine }) => step !== null && mine));
  readonly taken = computed(() => this.all().filter(({ step, mine }) => step !== null && !mine));
  /** What whoever is here was at and has written nothing about. */
  readonly unwritten = computed<readonly UnwrittenRow[]>(() => {
    const person = this.session.person()?.id;
    const shift = this.shift();
    if (person === undefined || !shift) return [];
    const since = shift.startsAt - UNWRITTEN;
    return this.book
      .looms()
      .flatMap((loom) =>
        this.calls
          .unwritten(loom.id, shift, person, since)
          .map(({ id, attendedAt }) => ({ id, loom, attendedAt })),
      )
      .sort((a, b) => a.attendedAt - b.attendedAt);
  });

  private readonly clothNames = computed(
    () => new Map(this.book.reference().cloths.map(({ id, name }) => [id, name])),
  );
  private readonly ownAlleys = computed<ReadonlySet<string>>(() => {
    const person = this.session.person()?.id ?? '';
    const alleys = this.book.reference().alleys ?? [];
    return new Set(
      alleys
        .filter(({ shedId, tacklerIds }) => shedId === this.book.shedId() && tacklerIds.includes(person))
        .map(({ name }) => name),
    );
  });

  loomById(id: string): Loom | null {
    return this.book.looms().find((loom) => loom.id === id) ?? null;
  }

  /** Open calls of one loom. */
  ofLoom(loom: Loom): Signal<readonly CallRow[]> {
    let calls = this.byLoom.get(loom.id);
    if (!calls) this.byLoom.set(loom.id, (calls = computed(() => this.rowsOf(loom))));
    return calls;
  }

  /** What the loom stands for now; null: as far as this device knows it runs. */
  standingOf(loomId: string): LineStop | null {
    const shift = this.shift();
    const line = shift && this.book.lineOf(loomId, shift);
    return line?.stops.filter((stop) => stop.timed && stop.until === null && !stop.shedWide).at(-1) ?? null;
  }

  causeName(cause: string, at: number): string {
    return this.causeAt(cause, at)?.name ?? cause;
  }

  clothOf(loomId: string): { readonly id: string; readonly name: string } | null {
    const shift = this.shift();
    const fitting = shift && this.calls.fittingOf(loomId, shift);
    return fitting
      ? { id: fitting.clothId, name: this.clothNames().get(fitting.clothId) ?? fitting.clothId }
      : null;
  }

  /** Beams that lie in other looms now, as far as this device knows. */
  fittedElsewhere(loomId: string): ReadonlySet<string> {
    const shift = this.shift();
    if (!shift) return new Set();
    return new Set(
      this.book
        .looms()
        .filter(({ id }) => id !== loomId)
        .flatMap(({ id }) => this.calls.fittingOf(id, shift)?.warpId ?? []),
    );
  }

  private rowsOf(loom: Loom): readonly CallRow[] {
    const shift = this.shift();
    if (!shift) return [];
    const calls = this.calls.openCalls(loom.id, shift);
    if (calls.length === 0) return [];
    const line = this.book.lineOf(loom.id, shift);
    const me = this.session.person()?.id;
    const cloth = this.clothOf(loom.id)?.name ?? 'cloth not known';
    return calls.map((call): CallRow => {
      const stop = line?.stops.find(({ id }) => id === call.stopId);
      return {
        ...call,
        loom,
        cloth,
        stands: stop
          ? { words: this.causeName(stop.cause, stop.from), since: stop.from, cause: stop.cause }
          : null,
        minutes: 0,
        mine: call.takenBy !== null && call.takenBy === me,
        taker: this.nameOf(call.takenBy),
        ownAlley: this.ownAlleys().has(loom.alley),
      };
    });
  }

  /** Names are told to whoever may see people, as the server's scope has it. */
  private nameOf(person: string | null): string {
    if (person === null || person === '-' || !this.session.may('people.read')) return '';
    return this.book.people().find(({ id }) => id === person)?.shortName ?? '';
  }

  private causeAt(cause: string, at: number): CauseVersion | undefined {
    const versions = this.book.reference().causeVersions.filter(({ causeId }) => causeId === cause);
    return inForceAt(versions, at) ?? versions[0];
  }
}
