import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Shift } from '@shared/contract/reference';
import { formatMinutes } from '@shared/figures/format';
import { Clock } from '../../core/clock';
import { HalfTyped } from '../../offline/half-typed';
import { OfflineBook } from '../../offline/offline-book';
import { PersonalWays } from '../../offline/personal-ways';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { PickPad, type PickReading } from '../../ui/pick-pad';
import { ReadingBar } from '../../ui/reading-bar';
import type { LoomView } from './loom-view';
import { LoomsideStore } from './loomside-store';
import { sharePerns } from './pern-count';
import { PernCounter } from './pern-counter';
import { PernWayChoice } from './pern-way-choice';
import { endQuestion } from './reading-question';
import { Saving } from './saving';
import { ShiftFigures } from './shift-figures';

/** Before this, a hand-over is early and the page says so. */
const EARLY = 30 * 60_000;

type Turn =
  | { readonly step: 'reading' | 'perns'; readonly view: LoomView }
  /** The perns of these looms in one count. */
  | { readonly step: 'set-perns'; readonly views: readonly LoomView[] };

/** Hands over: each loom's end reading and its perns, or the set's, in one pass; then the shift's figures. */
@Component({
  selector: 'app-hand-over-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [
    EmptyState,
    ErrorState,
    MatButton,
    ReadingBar,
    PernCounter,
    PernWayChoice,
    PickPad,
    RouterLink,
    ShiftFigures,
  ],
  host: { '[class.narrow]': 'now() !== null' },
  templateUrl: './hand-over-page.html',
  styleUrl: './pass.scss',
})
export class HandOverPage {
  /** From the address: a shift that has ended; else the one that runs. */
  readonly shift = input<string>();

  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  protected readonly typed = inject(HalfTyped);
  protected readonly ways = inject(PersonalWays);
  protected readonly store = inject(LoomsideStore);
  protected readonly saving = new Saving();

  protected readonly ready = computed(() => this.store.ready() && this.typed.ready() && this.ways.ready());
  protected readonly ofShift = computed(() => {
    const key = this.shift();
    return key ? (this.book.shifts().find((shift) => shift.key === key) ?? null) : this.store.shift();
  });
  protected readonly unknownShift = computed(() => Boolean(this.shift()) && this.ofShift() === null);
  protected readonly set = computed(() => {
    const shift = this.ofShift();
    return shift ? this.store.setIn(shift) : [];
  });
  protected readonly skipped = signal<readonly string[]>([]);
  /** Looms whose perns were counted, or whose taps are all. */
  private readonly counted = signal<readonly string[]>([]);
  /** Whose reading is being kept: pressed twice it counts once; the next loom's is not lost meanwhile. */
  private keeping: string | null = null;

  /** What is to be done now. */
  protected readonly now = computed<Turn | null>(() => {
    const way = this.ways.perns();
    const here = this.set().filter((view) => !this.skipped().includes(view.loom.id));
    for (const view of here) {
      if (view.needsEnd) return { step: 'reading', view };
      if (way === 'each-loom' && this.needsPerns(view)) return { step: 'perns', view };
    }
    const views = way === 'whole-set' ? here.filter((view) => this.needsPerns(view)) : [];
    return views.length ? { step: 'set-perns', views } : null;
  });
  protected readonly toGo = computed(
    () => this.set().filter((view) => view.needsEnd && !this.skipped().includes(view.loom.id)).length,
  );
  protected readonly heading = computed(() => {
    const now = this.now();
    if (now?.step !== 'set-perns') return `Loom ${now?.view.loom.number}`;
    return `Looms ${now.views.map((view) => view.loom.number).join(', ')}`;
  });
  protected readonly question = computed(() => {
    const now = this.now();
    const version = now?.step === 'reading' && this.book.loomVersionOf(now.view.loom.id);
    return version ? endQuestion(version, now.view.line, this.clock.correctedNow()) : null;
  });
  /** Under which something half typed is kept. */
  protected readonly typedAs = computed(() => {
    const now = this.now();
    const what = now?.step === 'set-perns' ? 'set' : now?.view.loom.id;
    return `${this.ofShift()?.key} ${what} ${now?.step === 'reading' ? 'end' : 'perns'}`;
  });
  protected readonly taps = computed(() => {
    const now = this.now();
    if (now?.step === 'perns') return now.view.perns;
    return now?.step === 'set-perns' ? now.views.reduce((sum, view) => sum + view.perns, 0) : 0;
  });
  protected readonly early = computed(() => {
    const shift = this.ofShift();
    const left = shift ? shift.endsAt - this.clock.tick() : 0;
    return left > EARLY ? formatMinutes(Math.round(left / 60_000)) : '';
  });

  protected async keepReading(reading: PickReading): Promise<void> {
    const now = this.now();
    const shift = this.ofShift();
    if (now?.step !== 'reading' || !shift || this.keeping === now.view.loom.id) return;
    const typedAs = this.typedAs();
    this.keeping = now.view.loom.id;
    const saved = await this.saving.keep(() =>
      this.book.log({
        kind: 'reading',
        loomId: now.view.loom.id,
        shiftKey: shift.key,
        boundary: 'end',
        value: reading.value,
        ...(reading.kept && { kept: true }),
      }),
    );
    this.keeping = null;
    if (saved) this.typed.keep(typedAs, '');
  }

  protected async keepPerns(total: number): Promise<void> {
    const now = this.now();
    const shift = this.ofShift();
    if (!now || now.step === 'reading' || !shift || this.saving.busy()) return;
    const typedAs = this.typedAs();
    if (await this.saving.keep(() => this.logPerns(now, shift, total))) {
      this.typed.keep(typedAs, '');
      this.goOn(now);
    }
  }

  /** The taps are all there was. */
  protected tapsAreAll(): void {
    const now = this.now();
    if (now) this.goOn(now);
  }

  protected skip(): void {
    const now = this.now();
    if (now?.step === 'reading') this.skipped.update((ids) => [...ids, now.view.loom.id]);
  }

  private logPerns(now: Turn, shift: Shift, total: number): Promise<unknown> {
    const shares =
      now.step === 'set-perns'
        ? sharePerns(
            total,
            now.views.map(({ line }) => line.picks),
          )
        : [total];
    const views = now.step === 'set-perns' ? now.views : [now.view];
    return this.book.logAll(
      views.map(({ loom }, i) => ({
        kind: 'count',
        loomId: loom.id,
        shiftKey: shift.key,
        cause: 'pern-change',
        total: shares[i] ?? 0,
      })),
    );
  }

  private needsPerns(view: LoomView): boolean {
    return !this.counted().includes(view.loom.id) && view.line.handOverCounts['pern-change'] === undefined;
  }

  private goOn(now: Turn): void {
    const done = now.step === 'set-perns' ? now.views.map(({ loom }) => loom.id) : [now.view.loom.id];
    this.counted.update((ids) => [...ids, ...done]);
  }
}
