import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatProgressBar } from '@angular/material/progress-bar';
import { RouterLink } from '@angular/router';
import { formatMinutes } from '@shared/figures/format';
import { Clock } from '../../core/clock';
import { NOT_SAVED, NotSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { PickPad, type PickReading } from '../../ui/pick-pad';
import { LoomsideStore } from './loomside-store';
import { PernCounter } from './pern-counter';
import { endQuestion } from './reading-question';
import { ShiftFigures } from './shift-figures';

/** Before this, a hand-over is early and the page says so. */
const EARLY = 30 * 60_000;

/** Hands over: each loom's end reading and perns in one pass, then the shift's figures. */
@Component({
  selector: 'app-hand-over-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [
    EmptyState,
    ErrorState,
    MatButton,
    MatProgressBar,
    PernCounter,
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
  protected readonly store = inject(LoomsideStore);

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
  protected readonly failure = signal('');
  protected readonly busy = signal(false);
  /** Whose reading is being kept: pressed twice it counts once; the next loom's is not lost meanwhile. */
  private keeping: string | null = null;

  /** The loom whose turn it is, and for what. */
  protected readonly now = computed(() => {
    for (const view of this.set()) {
      if (this.skipped().includes(view.loom.id)) continue;
      if (view.needsEnd) return { view, step: 'reading' as const };
      if (!this.isCounted(view.loom.id) && view.line.handOverCounts['pern-change'] === undefined)
        return { view, step: 'perns' as const };
    }
    return null;
  });
  protected readonly toGo = computed(
    () => this.set().filter((view) => view.needsEnd && !this.skipped().includes(view.loom.id)).length,
  );
  protected readonly question = computed(() => {
    const now = this.now();
    const version = now && this.book.loomVersionOf(now.view.loom.id);
    return now?.step === 'reading' && version
      ? endQuestion(version, now.view.line, this.clock.correctedNow())
      : null;
  });
  protected readonly early = computed(() => {
    const shift = this.ofShift();
    const left = shift ? shift.endsAt - this.clock.tick() : 0;
    return left > EARLY ? formatMinutes(Math.round(left / 60_000)) : '';
  });

  protected async keepReading(reading: PickReading): Promise<void> {
    const now = this.now();
    const shift = this.ofShift();
    if (!now || !shift || this.keeping === now.view.loom.id) return;
    this.keeping = now.view.loom.id;
    await this.keep(() =>
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
  }

  protected async keepPerns(total: number): Promise<void> {
    const now = this.now();
    const shift = this.ofShift();
    if (!now || !shift || this.busy()) return;
    const loomId = now.view.loom.id;
    const saved = await this.keep(() =>
      this.book.log({
        kind: 'count',
        loomId,
        shiftKey: shift.key,
        cause: 'pern-change',
        total,
      }),
    );
    if (saved) this.nextLoom(loomId);
  }

  /** The taps are all there was. */
  protected tapsAreAll(): void {
    const now = this.now();
    if (now) this.nextLoom(now.view.loom.id);
  }

  protected skip(): void {
    const now = this.now();
    if (now) this.skipped.update((ids) => [...ids, now.view.loom.id]);
  }

  private isCounted(loomId: string): boolean {
    return this.counted().includes(loomId);
  }

  private nextLoom(loomId: string): void {
    this.counted.update((ids) => [...ids, loomId]);
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
