import {
  ChangeDetectionStrategy,
  Component,
  afterNextRender,
  computed,
  inject,
  input,
  output,
  viewChild,
} from '@angular/core';
import type { ElementRef } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import type { Loom } from '@shared/contract/reference';
import { BREAKS_PER } from '@shared/figures/breaks';
import { ratio } from '@shared/figures/efficiency';
import { formatCount, formatMinutes, formatPercent, formatRate } from '@shared/figures/format';
import { isNoFigure, noFigureSentence, type Figure } from '@shared/figures/no-figure';
import { mostPicks } from '@shared/figures/totals';
import { SessionStore } from '../../core/session-store';
import { CauseMark } from '../../ui/cause-mark';
import { CAUTION } from '../../ui/caution';
import { ClothStrip } from '../../ui/cloth-strip';
import { clockTime } from '../../ui/clock-time';
import { FloorStore } from './floor-store';
import { flagsOf, readingsOf, storyOf } from './line-story';

interface Fact {
  readonly label: string;
  readonly value: string;
  readonly made: string;
}

/** A loom's line, opened from its tile: what happened, with times; readings, flags, figures. A sheet over the floor. */
@Component({
  selector: 'app-loom-sheet',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [CauseMark, ClothStrip, MatButton, MatIcon, RouterLink],
  templateUrl: './loom-sheet.html',
  styleUrl: './loom-sheet.scss',
})
export class LoomSheet {
  readonly loom = input.required<Loom>();
  readonly before = input<Loom | null>(null);
  readonly after = input<Loom | null>(null);
  readonly closed = output<void>();
  /** The loom beside it is wanted. */
  readonly went = output<string>();

  private readonly store = inject(FloorStore);
  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');
  protected readonly mayReadSheet = inject(SessionStore).may('sheet.read');
  protected readonly caution = CAUTION;

  protected readonly view = computed(() => this.store.viewOf(this.loom())());
  protected readonly place = computed(() => {
    const { row, position, alley } = this.loom();
    return `Row ${row}, place ${position}${alley ? `, alley ${alley}` : ''}`;
  });
  protected readonly shiftWords = computed(() => {
    const shift = this.store.shift();
    return shift ? `${shift.name}, ${this.time(shift.startsAt)} to ${this.time(shift.endsAt)}` : '';
  });
  protected readonly stands = computed(() => {
    const view = this.view();
    if (!view?.standing) return null;
    const { words, since, planned } = view.standing;
    const minutes = Math.floor(Math.max(0, view.at - since) / 60_000);
    return { words, planned, length: formatMinutes(minutes), since: this.time(since) };
  });
  protected readonly called = computed(() => {
    const call = this.view()?.call;
    return call ? `${call.words} ${this.time(call.since)}` : '';
  });
  protected readonly facts = computed<readonly Fact[]>(() => {
    const view = this.view();
    if (!view) return [];
    const { totals, atMost } = view;
    const picks: Figure = view.line.picks ?? mostPicks(totals);
    const most = atMost ? 'at most, by logged stops' : 'by readings';
    const rateWords = (count: number) => {
      const rate = ratio(count * BREAKS_PER, picks, 'no-picks');
      if (isNoFigure(rate)) return noFigureSentence(rate);
      return `${atMost ? 'at least ' : ''}${formatRate(rate)} per 10⁵ picks`;
    };
    const breaks = (label: string, count: number): Fact => ({
      label,
      value: formatCount(count),
      made: count === 0 ? 'none logged' : rateWords(count),
    });
    return [
      {
        label: 'Efficiency without shed stops',
        value: shown(view.efficiency, formatPercent),
        ...made(view.efficiency, () => most),
      },
      { label: 'Picks', value: shown(picks, formatCount), ...made(picks, () => most) },
      breaks('Warp breaks', totals.warpBreaks),
      breaks('Weft breaks', totals.weftBreaks),
      {
        label: 'Stood',
        value: formatMinutes(Math.round(totals.stopMinutes)),
        made: `${formatMinutes(Math.round(totals.measuredMinutes))} timed, ${formatMinutes(Math.round(totals.estimatedMinutes))} estimated`,
      },
      {
        label: 'Perns',
        value: formatCount(totals.perns),
        made: totals.perns ? 'as logged' : 'counted at hand-over',
      },
    ];
  });
  protected readonly story = computed(() => {
    const view = this.view();
    return view ? storyOf(view.line, view.at, this.say) : [];
  });
  protected readonly readings = computed(() => {
    const line = this.view()?.line;
    return line ? readingsOf(line, this.say) : [];
  });
  protected readonly flags = computed(() => {
    const view = this.view();
    return view ? flagsOf(view.line, view.at) : [];
  });
  protected readonly sheetKey = computed(() => this.store.shift()?.key ?? '');

  private readonly say = {
    causeName: (cause: string, at: number) => this.store.causeName(cause, at),
    time: (at: number) => this.time(at),
  };

  constructor() {
    // The browser keeps the focus in it, and gives it back to the tile when it closes.
    afterNextRender(() => this.dialog().nativeElement.showModal());
  }

  protected close(): void {
    this.dialog().nativeElement.close();
  }

  private time(at: number): string {
    return clockTime(at, this.store.timeZone());
  }
}

function shown(figure: Figure, format: (value: number) => string): string {
  return isNoFigure(figure) ? '–' : format(figure);
}

function made(figure: Figure, words: (value: number) => string): { readonly made: string } {
  return { made: isNoFigure(figure) ? noFigureSentence(figure) : words(figure) };
}
