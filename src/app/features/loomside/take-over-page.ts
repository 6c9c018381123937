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
import { MatProgressBar } from '@angular/material/progress-bar';
import { Router, RouterLink } from '@angular/router';
import type { Loom, Shift } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import type { EntryDraft } from '../../offline/entry-draft';
import { NOT_SAVED, NotSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { PickPad, type PickReading } from '../../ui/pick-pad';
import { LoomsideStore } from './loomside-store';
import { startQuestion } from './reading-question';

/** Takes over a set of looms: which, then each one's start reading, in one pass. A skipped loom stays to be read. */
@Component({
  selector: 'app-take-over-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, ErrorState, MatButton, MatProgressBar, PickPad, RouterLink],
  host: { '[class.narrow]': 'reading() && now() !== null' },
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
  protected readonly store = inject(LoomsideStore);

  protected readonly shift = linkedSignal<readonly Shift[], Shift | null>({
    source: () => this.store.takeOverShifts(),
    computation: (shifts, before) =>
      shifts.find((shift) => shift.key === before?.value?.key) ?? shifts[0] ?? null,
  });
  protected readonly rows = computed(() => {
    const rows = new Map<number, Loom[]>();
    for (const loom of this.book.looms()) rows.set(loom.row, [...(rows.get(loom.row) ?? []), loom]);
    return [...rows].map(([row, looms]) => ({ row, looms }));
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
  /** What I mind already, else my usual set, else nothing. */
  protected readonly chosen = linkedSignal<readonly string[]>(() => {
    const mine = this.mine();
    return mine.length ? mine : this.usual();
  });
  /** Choosing is done, or only readings were asked for. */
  protected readonly reading = linkedSignal(() => this.read() !== undefined);
  protected readonly skipped = signal<readonly string[]>([]);
  protected readonly failure = signal('');
  protected readonly busy = signal(false);
  /** Whose reading is being kept: pressed twice it counts once; the next loom's is not lost meanwhile. */
  private keeping: string | null = null;

  protected readonly toRead = computed(() => {
    const shift = this.shift();
    if (!shift) return [];
    return this.store
      .setIn(shift)
      .filter((view) => this.clockOf(view.loom.id)?.clock.kind !== 'zeroed-each-shift')
      .filter((view) => !view.line.readings.some((one) => one.boundary === 'start' && one.from === 'own'))
      .filter((view) => this.read() === undefined || view.needsStart)
      .map((view) => view.loom);
  });
  protected readonly now = computed(
    () => this.toRead().find((loom) => !this.skipped().includes(loom.id)) ?? null,
  );
  protected readonly total = computed(() => (this.shift() ? this.mine().length : 0));
  protected readonly question = computed(() => {
    const loom = this.now();
    const shift = this.shift();
    const version = loom && this.clockOf(loom.id);
    return loom && shift && version
      ? startQuestion(version, this.book.lastReading(loom.id, shift), shift.key, this.clock.correctedNow())
      : null;
  });
  protected readonly lastWords = computed(() => {
    const loom = this.now();
    const last = loom && this.book.lastReading(loom.id, this.shift());
    return last ? `Last reading, ${clockTime(last.at, this.store.timeZone())}` : 'Last reading';
  });

  protected isChosen(loom: Loom): boolean {
    return this.chosen().includes(loom.id);
  }

  protected isTaken(loom: Loom): boolean {
    const weaver = this.book.weaverOf(loom.id, this.shift());
    return weaver !== null && weaver !== this.session.person()?.id;
  }

  protected toggle(loom: Loom): void {
    const chosen = this.chosen();
    this.chosen.set(this.isChosen(loom) ? chosen.filter((id) => id !== loom.id) : [...chosen, loom.id]);
  }

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
    if (!shift || !weaverId || loomIds.length === 0 || this.busy()) return;
    const left = this.mine().filter((id) => !loomIds.includes(id));
    const same = left.length === 0 && loomIds.every((id) => this.mine().includes(id));
    const drafts: EntryDraft[] = same
      ? []
      : [{ kind: 'assign', shiftKey: shift.key, weaverId, loomIds: [...loomIds] }];
    if (left.length) drafts.push({ kind: 'assign', shiftKey: shift.key, weaverId: null, loomIds: left });
    if (await this.keep(() => this.book.logAll(drafts))) this.reading.set(true);
    if (this.reading() && this.now() === null) await this.finish();
  }

  protected async keepReading(reading: PickReading): Promise<void> {
    const loom = this.now();
    const shift = this.shift();
    if (!loom || !shift || this.keeping === loom.id) return;
    this.keeping = loom.id;
    await this.keep(() =>
      this.book.log({
        kind: 'reading',
        loomId: loom.id,
        shiftKey: shift.key,
        boundary: 'start',
        value: reading.value,
        ...(reading.kept && { kept: true }),
      }),
    );
    this.keeping = null;
    if (!this.failure() && this.now() === null) await this.finish();
  }

  /** The clock shows what it showed last. */
  protected confirm(): Promise<void> {
    const value = this.question()?.previous;
    return value === null || value === undefined
      ? Promise.resolve()
      : this.keepReading({ value, kept: false });
  }

  protected async skip(): Promise<void> {
    const loom = this.now();
    if (loom) this.skipped.update((ids) => [...ids, loom.id]);
    if (this.now() === null) await this.finish();
  }

  private async finish(): Promise<void> {
    await this.router.navigateByUrl('/loomside');
  }

  private clockOf(loomId: string) {
    return this.book.loomVersionOf(loomId);
  }

  private async keep(save: () => Promise<unknown>): Promise<boolean> {
    this.busy.set(true);
    this.failure.set('');
    try {
      await save();
      navigator.vibrate?.(40);
      return true;
    } catch (error) {
      this.failure.set(error instanceof NotSaved ? error.sentence : NOT_SAVED['storage-closed']);
      return false;
    } finally {
      this.busy.set(false);
    }
  }
}

function sameLooms(one: readonly string[], other: readonly string[]): boolean {
  return one.length === other.length && one.every((id, i) => id === other[i]);
}
