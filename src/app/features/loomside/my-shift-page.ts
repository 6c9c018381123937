import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { USUAL_WEEKS } from '@shared/contract/usual';
import { formatCount, formatMinutes, formatPercent } from '@shared/figures/format';
import { isNoFigure, noFigureSentence } from '@shared/figures/no-figure';
import { OfflineBook } from '../../offline/offline-book';
import { UsualStore } from '../../offline/usual-store';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { ReadingBar } from '../../ui/reading-bar';
import { addedUp, againstUsual, usualRate, usualWords, type Counted } from './against-usual';
import { ExplainForm } from './explain-form';
import { LoomsideStore } from './loomside-store';
import { PayWords } from './pay-words';

const COUNTED: readonly { readonly what: Counted; readonly label: string }[] = [
  { what: 'stops', label: 'Stops, perns apart' },
  { what: 'warp', label: 'Warp breaks' },
  { what: 'weft', label: 'Weft breaks' },
];

/** My shift so far: what my looms gave, beside what they usually give with this cloth; then what is unaccounted. */
@Component({
  selector: 'app-my-shift-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, ExplainForm, MatButton, ReadingBar, PayWords, RouterLink],
  templateUrl: './my-shift-page.html',
  styleUrls: ['./pass.scss', './my-shift-page.scss'],
})
export class MyShiftPage {
  /** From the address: a shift that has ended; else the one that runs. */
  readonly shift = input<string>();

  private readonly book = inject(OfflineBook);
  private readonly usual = inject(UsualStore);
  protected readonly store = inject(LoomsideStore);
  protected readonly weeks = USUAL_WEEKS;
  /** The loom that is being explained. */
  protected readonly explained = signal<string | null>(null);

  protected readonly ofShift = computed(() => {
    const key = this.shift();
    return key ? (this.book.shifts().find((shift) => shift.key === key) ?? null) : this.store.shift();
  });
  protected readonly set = computed(() => {
    const shift = this.ofShift();
    return shift ? this.store.setIn(shift) : [];
  });
  protected readonly looms = computed(() =>
    this.set().map((view) => {
      const row = this.usual.rowOf(view.loom.id, view.clothId);
      return {
        view,
        counts: COUNTED.map(({ what }) =>
          againstUsual(countOf(view, what), view.picks, usualRate(row, what)),
        ),
      };
    }),
  );
  protected readonly rows = computed(() =>
    this.looms().map(({ view, counts }) => ({
      id: view.loom.id,
      number: view.loom.number,
      cloth: view.cloth,
      picks: isNoFigure(view.picks) ? '–' : formatCount(Math.round(view.picks)),
      efficiency: isNoFigure(view.efficiency)
        ? `no figure, because ${noFigureSentence(view.efficiency)}`
        : `efficiency ${formatPercent(view.efficiency)}, shed stops left out`,
      soFar: view.soFar,
      counts: counts.map((one, i) => ({
        label: COUNTED[i]?.label ?? '',
        count: formatCount(one.count),
        usual: usualWords(one) || 'nothing usual known',
      })),
    })),
  );
  protected readonly totals = computed(() =>
    COUNTED.map(({ label }, i) => {
      const all = addedUp(this.looms().flatMap(({ counts }) => counts[i] ?? []));
      return { label, count: formatCount(all.count), usual: usualWords(all) };
    }),
  );
  protected readonly picks = computed(() => {
    const picks = this.set().map((view) => view.picks);
    const known = picks.flatMap((one) => (isNoFigure(one) ? [] : one));
    return {
      sum: formatCount(Math.round(known.reduce((sum, one) => sum + one, 0))),
      atMost: this.set().some((view) => view.soFar),
      missing: picks.length - known.length,
    };
  });
  /** Looms that are read and have a minute or more that nobody logged. */
  protected readonly unaccounted = computed(() =>
    this.set().flatMap((view) => {
      const minutes = Math.round(view.unlogged ?? 0);
      return minutes >= 1 ? [{ view, minutes, words: formatMinutes(minutes) }] : [];
    }),
  );
  protected readonly anyRead = computed(() => this.set().some((view) => !view.soFar));
  protected readonly words = computed(() => {
    const shift = this.ofShift();
    const zone = this.store.timeZone();
    return shift
      ? `${shift.name}, ${clockTime(shift.startsAt, zone)} to ${clockTime(shift.endsAt, zone)}`
      : '';
  });
  protected readonly over = computed(() => this.ofShift() !== this.store.shift());
}

function countOf(view: { warpBreaks: number; weftBreaks: number; stops: number }, what: Counted): number {
  return what === 'warp' ? view.warpBreaks : what === 'weft' ? view.weftBreaks : view.stops;
}
