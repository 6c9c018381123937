import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { formatCount, formatMinutes, formatPercent, formatRate } from '@shared/figures/format';
import { isNoFigure, noFigureSentence } from '@shared/figures/no-figure';
import type { Figure } from '@shared/figures/no-figure';

export type FigureKind = 'percent' | 'rate' | 'count' | 'minutes';

/**
 * A figure: the number large, its unit beside it, what it is made of beneath, its flag beside that. Where there is
 * none it says "no figure, because …".
 */
@Component({
  selector: 'app-figure-view',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (reason(); as because) {
      <span class="none">no figure, because {{ because }}</span>
    } @else {
      <span class="value"
        >{{ number() }}
        @if (unitShown()) {
          <small> {{ unitShown() }}</small>
        }
      </span>
    }
    @if (label() || flag()) {
      <span class="label">
        {{ label() }}
        @if (flag()) {
          <span class="flag" [class]="flagTone()">{{ flag() }}</span>
        }
      </span>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 2px;
      justify-items: start;
    }
    .value {
      font: 700 var(--figure-size, 2.25rem) / 1.05 var(--text-family);
      font-variant-numeric: tabular-nums;
      letter-spacing: -0.01em;
      white-space: nowrap;
    }
    small {
      font: 500 0.55em var(--text-family);
      color: var(--ink-2);
      letter-spacing: 0;
    }
    .none {
      font-size: 0.9375rem;
      color: var(--ink-2);
      max-width: 26ch;
      line-height: 1.25;
    }
    .label {
      color: var(--ink-2);
      font-size: 0.9375rem;
    }
  `,
})
export class FigureView {
  readonly figure = input.required<Figure>();
  readonly kind = input<FigureKind>('count');
  /** Replaces the unit of the kind: "per 10⁵ picks". */
  readonly unit = input('');
  /** What the figure is made of. */
  readonly label = input('');
  readonly flag = input('');
  readonly flagTone = input<'calm' | 'look' | 'now' | 'good'>('look');

  protected readonly reason = computed(() => {
    const figure = this.figure();
    return isNoFigure(figure) ? noFigureSentence(figure) : '';
  });
  protected readonly number = computed(() => {
    const figure = this.figure();
    if (isNoFigure(figure)) return '';
    switch (this.kind()) {
      case 'percent':
        return formatPercent(figure).replace('%', '');
      case 'rate':
        return formatRate(figure);
      case 'count':
        return formatCount(figure);
      case 'minutes':
        return formatMinutes(figure);
    }
  });
  protected readonly unitShown = computed(() => this.unit() || (this.kind() === 'percent' ? '%' : ''));
}
