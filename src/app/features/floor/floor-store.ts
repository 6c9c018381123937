import { Injectable, computed, inject, signal, untracked, type Signal } from '@angular/core';
import { inForceAt, type CauseVersion, type Loom, type Shift, type Target } from '@shared/contract/reference';
import type { LoomLine } from '@shared/entries/loom-line';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import { LiveReach } from '../../offline/live-reach';
import { OfflineBook, type OpenCallView } from '../../offline/offline-book';
import { ShedBook } from '../../offline/shed-book';
import type { StripLine } from '../../ui/strip-geometry';
import { stripLineOf } from '../../ui/strip-line';
import { floorLoom, type FloorLoom } from './floor-loom';
import { floorPlan, type FloorRow } from '../../ui/floor-plan';
import { FLOOR_FILTERS, passes, type FloorFilter } from './floor-filters';
import { floorTotals } from './floor-totals';

/** What a loom's tile is made of, each a signal: what is so again makes nothing anew. */
interface LoomSources {
  readonly line: Signal<LoomLine | null>;
  readonly strip: Signal<StripLine | null>;
  readonly weaver: Signal<string>;
  readonly call: Signal<OpenCallView | null>;
  readonly notSent: Signal<number>;
}

/** How often minutes count on: the clock ticks at every exchange too, and a shed has many. */
const STEP = 10_000;

/**
 * The shed as this device knows it. Each loom is a signal of its own: an entry makes its loom anew, the step of the
 * clock counts all on, and nothing is projected again for it. Provided by the page.
 */
@Injectable()
export class FloorStore {
  private readonly book = inject(OfflineBook);
  private readonly shed = inject(ShedBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly reach = inject(LiveReach);
  private readonly views = new Map<string, Signal<FloorLoom | null>>();

  readonly live = this.reach.live;
  readonly knownUntil = this.reach.knownUntil;
  readonly catchingUp = this.reach.catchingUp;
  readonly timeZone = computed(() => this.book.reference().mill.timeZone);
  /** What is shown is so as of this moment: now while news arrive, then when they last did. */
  readonly asOf = computed(() => {
    const until = this.knownUntil();
    if (!this.live() && until !== null) return until;
    return Math.floor(this.clock.tick() / STEP) * STEP;
  });
  /** A strip moves on by the minute: nobody sees less, and two hundred need not be drawn at every step. */
  private readonly minute = computed(() => Math.floor(this.asOf() / 60_000));
  /** The shift that ran then: a book out of reach for a day still shows what it knew. */
  readonly shift = computed<Shift | null>(() => shiftAt(this.book.shifts(), this.asOf()));
  readonly nextShift = computed<Shift | null>(
    () => this.book.shifts().find((shift) => shift.startsAt > this.asOf()) ?? null,
  );
  readonly plan = computed<readonly FloorRow[]>(() => floorPlan(this.book.looms()));
  readonly looms = computed<readonly FloorLoom[]>(() =>
    this.book.looms().flatMap((loom) => this.viewOf(loom)() ?? []),
  );
  readonly totals = computed(() => floorTotals(this.looms(), this.asOf()));

  readonly filter = signal<FloorFilter>('all');
  readonly counts = computed(() => {
    const looms = this.looms();
    return FLOOR_FILTERS.map((filter) => ({
      filter,
      count: looms.filter((loom) => passes(filter, loom)).length,
    }));
  });
  /** Rows with what the filter lets through; rows without anything are left out. */
  readonly shown = computed<readonly FloorRow[]>(
    () => {
      const filter = this.filter();
      if (filter === 'all') return this.plan();
      const passing = new Set(
        this.looms()
          .filter((loom) => passes(filter, loom))
          .map(({ loom }) => loom.id),
      );
      return this.plan()
        .map((row) => ({ ...row, looms: row.looms.filter((loom) => passing.has(loom.id)) }))
        .filter((row) => row.looms.length > 0);
    },
    { equal: sameRows },
  );

  private readonly clothNames = computed(
    () => new Map(this.book.reference().cloths.map(({ id, name }) => [id, name])),
  );
  private readonly targets = computed(() => {
    const byCloth = new Map<string, Target[]>();
    for (const target of this.book.reference().targets ?? [])
      byCloth.set(target.clothId, [...(byCloth.get(target.clothId) ?? []), target]);
    return byCloth;
  });
  private readonly causes = computed(() => {
    const byCause = new Map<string, CauseVersion[]>();
    for (const version of this.book.reference().causeVersions)
      byCause.set(version.causeId, [...(byCause.get(version.causeId) ?? []), version]);
    return byCause;
  });
  private readonly names = computed(
    () => new Map(this.book.people().map((person) => [person.id, person.shortName])),
  );
  /** Who minds what is the foreman's and the manager's to see. */
  private readonly weavers = computed<ReadonlyMap<string, string | null>>(() => {
    const shift = this.shift();
    return shift && this.session.may('people.read') ? this.shed.weaversIn(shift) : new Map();
  });

  /** The loom as it stands; null: no shift runs. The same signal for the same loom. */
  viewOf(loom: Loom): Signal<FloorLoom | null> {
    let view = this.views.get(loom.id);
    if (!view) {
      const sources = this.sourcesOf(loom.id);
      this.views.set(loom.id, (view = computed(() => this.make(loom.id, sources))));
    }
    return view;
  }

  causeName(cause: string, at: number): string {
    return this.causeAt(cause, at)?.name ?? cause;
  }

  private sourcesOf(loomId: string): LoomSources {
    const line = computed(() => {
      const shift = this.shift();
      return shift && this.book.lineOf(loomId, shift);
    });
    const notSent = computed(() => this.book.notSent(loomId));
    return {
      line,
      strip: computed(() => {
        const one = line();
        this.minute();
        const at = untracked(() => this.momentOf(notSent()));
        return one && stripLineOf(one, at);
      }),
      weaver: computed(() => this.names().get(this.weavers().get(loomId) ?? '') ?? ''),
      call: computed(
        () => {
          const shift = this.shift();
          return shift && this.shed.callOf(loomId, shift);
        },
        { equal: sameCall },
      ),
      notSent,
    };
  }

  /**
   * As of when a loom is shown. What was logged here since is known here, though the book is out of reach; what just
   * arrived must not lie in the future only because the step of the clock is a coarse one.
   */
  private momentOf(notSent: number): number {
    const asOf = this.asOf();
    return this.live() || notSent > 0 ? Math.max(asOf, this.clock.correctedNow()) : asOf;
  }

  private make(loomId: string, sources: LoomSources): FloorLoom | null {
    const loom = this.book.looms().find(({ id }) => id === loomId);
    const line = sources.line();
    const strip = sources.strip();
    if (!loom || !line || !strip) return null;
    const notSent = sources.notSent();
    return floorLoom({
      loom,
      line,
      strip,
      clothName: (clothId) => this.clothNames().get(clothId ?? '') ?? 'cloth not known',
      causeAt: (cause, moment) => this.causeAt(cause, moment),
      targetOf: (clothId, moment) => this.targetOf(clothId, moment),
      weaver: sources.weaver(),
      call: sources.call(),
      notSent,
      at: this.momentOf(notSent),
    });
  }

  private targetOf(clothId: string, at: number): number | null {
    return inForceAt(this.targets().get(clothId) ?? [], at)?.efficiency ?? null;
  }

  private causeAt(cause: string, at: number): CauseVersion | undefined {
    const versions = this.causes().get(cause) ?? [];
    return inForceAt(versions, at) ?? versions[0];
  }
}

function shiftAt(shifts: readonly Shift[], at: number): Shift | null {
  return shifts.find((shift) => shift.startsAt <= at && at < shift.endsAt) ?? null;
}

function sameCall(a: OpenCallView | null, b: OpenCallView | null): boolean {
  return a?.id === b?.id && a?.state === b?.state && a?.step === b?.step && a?.stepAt === b?.stepAt;
}

function sameRows(a: readonly FloorRow[], b: readonly FloorRow[]): boolean {
  return (
    a.length === b.length &&
    a.every((row, i) => {
      const other = b[i];
      return (
        row === other ||
        (row.row === other?.row &&
          row.beyond === other.beyond &&
          row.places === other.places &&
          row.looms.length === other.looms.length &&
          row.looms.every((loom, j) => loom === other.looms[j]))
      );
    })
  );
}
