import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatIcon } from '@angular/material/icon';
import type { Loom } from '@shared/contract/reference';
import { formatCount, formatMinutes, formatPercent } from '@shared/figures/format';
import { isNoFigure, noFigureSentence } from '@shared/figures/no-figure';
import { ClothStrip } from '../../ui/cloth-strip';
import { clockTime } from '../../ui/clock-time';
import { stripWords } from '../../ui/strip-line';
import { FloorStore } from './floor-store';

/** A loom on the Floor: its number, its strip, how it goes. One that stands is a hole in the cloth: it turns to ink. */
@Component({
  selector: 'app-floor-tile',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ClothStrip, MatIcon],
  templateUrl: './floor-tile.html',
  styleUrl: './floor-tile.scss',
})
export class FloorTile {
  readonly loom = input.required<Loom>();
  /** A line of a phone's list instead of a tile. */
  readonly inList = input(false);
  readonly opened = output();

  private readonly store = inject(FloorStore);
  protected readonly view = computed(() => this.store.viewOf(this.loom())());
  protected readonly efficiency = computed(() => {
    const figure = this.view()?.efficiency;
    return figure === undefined || isNoFigure(figure) ? null : formatPercent(figure).replace('%', '');
  });
  protected readonly stood = computed(() => {
    const view = this.view();
    return view?.standing ? standingWords(view.at - view.standing.since) : '';
  });
  /** For a narrow tile: "1 h 20". */
  protected readonly stoodShort = computed(() => this.stood().replace(/(h \d+) min$/, '$1'));
  protected readonly since = computed(() => this.time(this.view()?.standing?.since));
  protected readonly called = computed(() => {
    const call = this.view()?.call;
    return call ? `${call.words} ${this.time(call.since)}` : '';
  });
  /** A standing loom's own words say that he is waited for, or there. */
  protected readonly callMark = computed(() => {
    const view = this.view();
    return view?.call && (!view.standing || view.call.unsent) ? this.called() : '';
  });
  protected readonly calledAt = computed(() =>
    this.view()?.standing && !this.callMark() ? this.time(this.view()?.call?.since) : '',
  );
  /** What somebody who does not see the tile hears, strip and all. */
  protected readonly words = computed(() => {
    const view = this.view();
    if (!view) return `Loom ${this.loom().number}`;
    const figure = view.efficiency;
    const how = view.standing
      ? `stands for ${this.stood()} since ${this.since()}: ${view.standing.words}`
      : isNoFigure(figure)
        ? `runs, no efficiency because ${noFigureSentence(figure)}`
        : `runs, efficiency ${view.atMost ? 'at most ' : ''}${formatPercent(figure)}`;
    return [
      `Loom ${view.loom.number} ${how}`,
      ...(this.called() ? [this.called()] : []),
      view.cloth,
      ...(view.weaver ? [`minded by ${view.weaver}`] : []),
      ...(view.notSent ? [`${view.notSent} not sent`] : []),
      // The stop in progress is told above.
      stripWords({ ...view.strip, stops: view.strip.stops.filter((stop) => stop.until !== null) }),
    ].join('. ');
  });

  private time(at: number | undefined): string {
    return at === undefined ? '' : clockTime(at, this.store.timeZone());
  }
}

/** "18 min", "1 h 31 min", from ten hours on whole hours. */
function standingWords(ms: number): string {
  const minutes = Math.floor(Math.max(0, ms) / 60_000);
  return minutes < 600 ? formatMinutes(minutes) : `${formatCount(Math.floor(minutes / 60))} h`;
}
