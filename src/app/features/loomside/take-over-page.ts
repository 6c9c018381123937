import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import type { Loom, Shift } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import type { EntryDraft } from '../../offline/entry-draft';
import { HalfTyped } from '../../offline/half-typed';
import { OfflineBook } from '../../offline/offline-book';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { PickPad, type PickReading } from '../../ui/pick-pad';
import { ReadingBar } from '../../ui/reading-bar';
import { GivenReadings, type GivenReading } from './given-readings';
import { LoomChoice } from './loom-choice';
import { LoomsideStore } from './loomside-store';
import { startQuestion } from './reading-question';
import { Saving } from './saving';

/** A reading to be taken: what a loom's shift starts with, or what it showed when it changed hands in mid-shift. */
interface ToRead {
  readonly loom: Loom;
  readonly boundary: 'start' | 'change';
}

/**
 * Takes over looms: which, then what the outgoing weaver has read confirmed for the set by one tap, then each clock
 * that is left. A skipped start reading stays to be read; a relief in mid-shift may go without.
 */
@Component({
  selector: 'app-take-over-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, ErrorState, GivenReadings, LoomChoice, MatButton, ReadingBar, PickPad, RouterLink],
  host: { '[class.narrow]': 'reading() && given().length === 0 && now() !== null' },
  templateUrl: './take-over-page.html',
  styleUrl: './pass.scss',
})
export class TakeOverPage {
  /** From the address: only the readings that are still missing. */
  readonly read = input<string>();

  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  protected readonly typed = inject(HalfTyped);
  protected readonly store = inject(LoomsideStore);
  protected readonly saving = new Saving();

  protected readonly shift = linkedSignal<readonly Shift[], Shift | null>({
    source: () => this.store.takeOverShifts(),
    computation: (shifts, before) =>
      shifts.find((shift) => shift.key === before?.value?.key) ?? shifts[0] ?? null,
  });
  // Equal by what is in them: news from the book must not undo what a person is choosing.
  private readonly mine = computed(
    () => this.book.setOf(this.session.person()?.id ?? null, this.shift()).map((loom) => loom.id),
    { equal: sameLooms },
  );
  private readonly usual = computed(
    () => this.book.people().find((person) => person.id === this.session.person()?.id)?.usualSet ?? [],
    { equal: sameLooms },
  );
  /** What I mind already, else my usual set, else nothing; in the order of my walk. */
  protected readonly chosen = linkedSignal<readonly string[]>(() => {
    const mine = this.mine();
    return mine.length ? mine : this.usual();
  });
  /** Choosing is done, or only readings were asked for. */
  protected readonly reading = linkedSignal(() => this.read() !== undefined);
  protected readonly skipped = signal<readonly string[]>([]);
  /** Looms that came to me in mid-shift, which somebody had read at its start. */
  private readonly relieved = signal<readonly string[]>([]);
  /** Looms that do not show what the outgoing weaver read: read one by one. */
  private readonly differ = signal<readonly string[]>([]);
  /** Whose reading is being kept: pressed twice it counts once; the next loom's is not lost meanwhile. */
  private keeping: string | null = null;

  protected readonly midShift = computed(() => {
    const shift = this.shift();
    return shift !== null && this.clock.tick() > shift.startsAt + LIMITS.readingOffBoundary;
  });
  protected readonly toRead = computed<readonly ToRead[]>(() => {
    const shift = this.shift();
    if (!shift) return [];
    return this.store
      .setIn(shift)
      .filter((view) => this.book.loomVersionOf(view.loom.id)?.clock.kind !== 'zeroed-each-shift')
      .flatMap((view): ToRead[] => {
        const { loom, line } = view;
        if (this.relieved().includes(loom.id)) return [{ loom, boundary: 'change' }];
        if (line.readings.some((one) => one.boundary === 'start' && one.from === 'own')) return [];
        return this.read() === undefined || view.needsStart ? [{ loom, boundary: 'start' }] : [];
      });
  });
  protected readonly left = computed(() =>
    this.toRead().filter(({ loom }) => !this.skipped().includes(loom.id)),
  );
  /** Start readings that the outgoing weaver's end readings already give. */
  protected readonly given = computed<readonly GivenReading[]>(() => {
    const shift = this.shift();
    if (!shift || this.read() !== undefined) return [];
    return this.left().flatMap(({ loom, boundary }) => {
      if (boundary !== 'start' || this.differ().includes(loom.id)) return [];
      const line = this.book.lineOf(loom.id, shift);
      const reading = line?.readings.find((one) => one.boundary === 'start' && one.from === 'neighbour');
      if (!reading) return [];
      const at = clockTime(reading.at, this.store.timeZone());
      return [{ loom, value: reading.newValue ?? reading.value, at }];
    });
  });
  protected readonly now = computed(() => this.left()[0] ?? null);
  protected readonly question = computed(() => {
    const loom = this.now()?.loom;
    const shift = this.shift();
    const version = loom && this.book.loomVersionOf(loom.id);
    return loom && shift && version
      ? startQuestion(version, this.book.lastReading(loom.id, shift), shift.key, this.clock.correctedNow())
      : null;
  });
  /** Under which a half-typed reading is kept. */
  protected readonly typedAs = computed(() => `${this.shift()?.key} ${this.question()?.id}`);
  protected readonly lastWords = computed(() => {
    const loom = this.now()?.loom;
    const last = loom && this.book.lastReading(loom.id, this.shift());
    return last ? `Last reading, ${clockTime(last.at, this.store.timeZone())}` : 'Last reading';
  });

  protected readonly isTaken = (loom: Loom): boolean => {
    const weaver = this.book.weaverOf(loom.id, this.shift());
    return weaver !== null && weaver !== this.session.person()?.id;
  };

  protected words(shift: Shift): string {
    const zone = this.store.timeZone();
    return `${shift.name}, ${clockTime(shift.startsAt, zone)} to ${clockTime(shift.endsAt, zone)}`;
  }

  protected previous(): string {
    const previous = this.question()?.previous;
    return previous === null || previous === undefined ? '' : formatCount(previous);
  }

  protected async takeOver(): Promise<void> {
    const shift = this.shift();
    const weaverId = this.session.person()?.id;
    const loomIds = this.chosen();
    if (!shift || !weaverId || loomIds.length === 0 || this.saving.busy()) return;
    const mine = this.mine();
    const left = mine.filter((id) => !loomIds.includes(id));
    // The walk is said whole where its order changed; else only what is new: minding goes on for the rest.
    const kept = loomIds.filter((id) => mine.includes(id));
    const sameWalk = sameLooms(
      kept,
      mine.filter((id) => loomIds.includes(id)),
    );
    const added = loomIds.filter((id) => !mine.includes(id));
    const atTheEnd = sameWalk && sameLooms(loomIds, [...kept, ...added]);
    const relief = this.midShift() ? added.filter((id) => this.hasStart(id, shift)) : [];
    const said = atTheEnd ? added : loomIds;
    const drafts: EntryDraft[] = said.length
      ? [{ kind: 'assign', shiftKey: shift.key, weaverId, loomIds: [...said] }]
      : [];
    if (left.length) drafts.push({ kind: 'assign', shiftKey: shift.key, weaverId: null, loomIds: left });
    if (await this.saving.keep(() => this.book.logAll(drafts))) {
      this.relieved.set(relief);
      this.reading.set(true);
    }
    if (this.reading() && this.now() === null) await this.finish();
  }

  /** The set shows what the outgoing weaver read. */
  protected async confirmGiven(given: readonly GivenReading[]): Promise<void> {
    const shift = this.shift();
    if (!shift || this.saving.busy()) return;
    await this.saving.keep(() =>
      this.book.logAll(
        given.map(({ loom, value }) => ({
          kind: 'reading',
          loomId: loom.id,
          shiftKey: shift.key,
          boundary: 'start',
          value,
        })),
      ),
    );
    if (!this.saving.failure() && this.now() === null) await this.finish();
  }

  protected readOneByOne(looms: readonly Loom[]): void {
    this.differ.update((ids) => [...ids, ...looms.map((loom) => loom.id)]);
  }

  protected async keepReading(reading: PickReading): Promise<void> {
    const now = this.now();
    const shift = this.shift();
    if (!now || !shift || this.keeping === now.loom.id) return;
    const typedAs = this.typedAs();
    this.keeping = now.loom.id;
    const saved = await this.saving.keep(() =>
      this.book.log({
        kind: 'reading',
        loomId: now.loom.id,
        shiftKey: shift.key,
        boundary: now.boundary,
        value: reading.value,
        ...(reading.kept && { kept: true }),
      }),
    );
    this.keeping = null;
    if (!saved) return;
    this.typed.keep(typedAs, '');
    this.relieved.update((ids) => ids.filter((id) => id !== now.loom.id));
    if (this.now() === null) await this.finish();
  }

  /** The clock shows what it showed last. */
  protected confirm(): Promise<void> {
    const value = this.question()?.previous;
    return value === null || value === undefined
      ? Promise.resolve()
      : this.keepReading({ value, kept: false });
  }

  protected async skip(): Promise<void> {
    const loom = this.now()?.loom;
    if (loom) this.skipped.update((ids) => [...ids, loom.id]);
    if (this.now() === null) await this.finish();
  }

  private async finish(): Promise<void> {
    await this.router.navigateByUrl('/loomside');
  }

  private hasStart(loomId: string, shift: Shift): boolean {
    return this.book.lineOf(loomId, shift)?.readings.some((one) => one.boundary === 'start') ?? false;
  }
}

function sameLooms(one: readonly string[], other: readonly string[]): boolean {
  return one.length === other.length && one.every((id, i) => id === other[i]);
}
