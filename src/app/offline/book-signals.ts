import { DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import {
  inForceAt,
  type CauseVersion,
  type Loom,
  type PersonCard,
  type Reference,
  type Shift,
} from '@shared/contract/reference';
import type { LoomLine } from '@shared/entries/loom-line';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import type { BookEvent } from './book-events';
import type { Touched } from './book-view';
import { notSaved } from './not-saved';
import { OfflineParts } from './offline-parts';

interface CachedLine {
  readonly version: number;
  readonly line: LoomLine;
}

/**
 * The book in memory as signals: each counts the changes of one part of it, so that a tap makes only what it touched
 * be worked out again. `OfflineBook` shows these to screens.
 */
@Injectable({ providedIn: 'root' })
export class BookSignals {
  private readonly parts = inject(OfflineParts);
  private readonly session = inject(SessionStore);
  private readonly clock = inject(Clock);
  private readonly view = this.parts.view;

  private readonly outboxVersion = signal(0);
  private readonly wholeVersion = signal(0);
  private readonly assignVersion = signal(0);
  private readonly loomVersions = new Map<string, ReturnType<typeof signal<number>>>();
  private readonly cache = new Map<string, CachedLine>();
  private readonly readyNow = signal(false);
  private readonly troubleNow = signal<string | null>(null);

  readonly ready = this.readyNow.asReadonly();
  readonly trouble = this.troubleNow.asReadonly();
  readonly reference = computed<Reference>(() => {
    this.wholeVersion();
    return this.view.reference;
  });
  readonly people = computed<readonly PersonCard[]>(() => {
    this.wholeVersion();
    return this.view.people;
  });
  readonly shedId = computed<string | null>(
    () =>
      this.session.device()?.shedId ??
      this.parts.shed() ??
      this.session.person()?.shedIds[0] ??
      this.reference().sheds[0]?.id ??
      null,
  );
  readonly looms = computed<readonly Loom[]>(
    () => {
      const now = this.clock.tick();
      const stands = (loom: Loom) => loom.from <= now && (loom.until === null || now < loom.until);
      return this.reference()
        .looms.filter((loom) => loom.shedId === this.shedId() && stands(loom))
        .sort((a, b) => a.row - b.row || a.position - b.position);
    },
    { equal: sameItems },
  );
  readonly causes = computed<readonly CauseVersion[]>(
    () => {
      const now = this.clock.tick();
      const byCause = new Map<string, CauseVersion[]>();
      for (const version of this.reference().causeVersions)
        byCause.set(version.causeId, [...(byCause.get(version.causeId) ?? []), version]);
      return [...byCause.values()]
        .map((versions) => inForceAt(versions, now))
        .filter((version) => version !== undefined);
    },
    { equal: sameItems },
  );
  readonly shifts = computed<readonly Shift[]>(() => {
    this.wholeVersion();
    return this.view.shiftsOf(this.shedId());
  });
  readonly currentShift = computed<Shift | null>(() => {
    this.wholeVersion();
    return this.view.shiftAt(this.shedId(), this.clock.tick());
  });

  constructor() {
    const stop = this.parts.listen((event, touched) => this.take(event, touched));
    inject(DestroyRef).onDestroy(stop);
    this.parts.start().then(
      () => {
        this.bumpAll();
        this.readyNow.set(true);
      },
      (error: unknown) => {
        this.troubleNow.set(notSaved(error).sentence);
        this.readyNow.set(true);
      },
    );
  }

  /** Makes whoever asks depend on the outbox. */
  outboxChanges(): number {
    return this.outboxVersion();
  }

  /** Makes whoever asks depend on who minds what. */
  assignChanges(): void {
    this.outboxVersion();
    this.wholeVersion();
    this.assignVersion();
  }

  /** Makes whoever asks depend on one loom's entries and on what all looms depend on. */
  loomChanges(loomId: string): number {
    let version = this.loomVersions.get(loomId);
    if (!version) this.loomVersions.set(loomId, (version = signal(0)));
    return this.wholeVersion() * VERSIONS + version();
  }

  /** The line, projected again only if something touched the loom. */
  line(loomId: string, shift: Shift): LoomLine {
    const version = this.loomChanges(loomId);
    const key = `${shift.key} ${loomId}`;
    const known = this.cache.get(key);
    if (known?.version === version) return known.line;
    const line = this.view.project(loomId, shift);
    this.cache.set(key, { version, line });
    return line;
  }

  private take(event: BookEvent, touched: Touched): void {
    if (event.kind === 'status') return;
    this.outboxVersion.update((n) => n + 1);
    if (event.kind === 'pulled') {
      const kinds = new Set(event.pull.entries.map(({ entry }) => entry['kind']));
      if (kinds.has('assign') || kinds.has('void')) this.assignVersion.update((n) => n + 1);
    }
    if (touched.all || (event.kind === 'pulled' && event.pull.people)) this.bumpAll();
    else for (const loomId of touched.loomIds) this.loomVersions.get(loomId)?.update((n) => n + 1);
  }

  private bumpAll(): void {
    this.cache.clear();
    this.wholeVersion.update((n) => n + 1);
    this.outboxVersion.update((n) => n + 1);
  }
}

/** A version of a loom and one of the whole, as one number. */
const VERSIONS = 1_000_000_000;

/** Two lists of the same things in the same order: what shows one need not be drawn again for the other. */
export function sameItems<T>(a: readonly T[], b: readonly T[]): boolean {
  return a.length === b.length && a.every((item, place) => item === b[place]);
}
