import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { noInterval } from '@shared/figures/breaks';
import { formatCount, formatMinutes, formatPercent, formatRate } from '@shared/figures/format';
import { lineFigures } from '@shared/figures/loom-line';
import { isNoFigure, noFigureSentence, type Figure } from '@shared/figures/no-figure';
import { Clock } from '../../core/clock';
import type { LoomView } from './loom-view';

/** What a shift came to on my looms, a row a loom; where a figure is missing its reason stands in its place. */
@Component({
  selector: 'app-shift-figures',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <table>
      <caption class="visually-hidden">
        Figures of the shift, a row a loom
      </caption>
      <thead>
        <tr>
          <th scope="col">Loom</th>
          <th scope="col" class="num">Picks</th>
          <th scope="col" class="num">Efficiency without shed stops</th>
          <th scope="col" class="num">Picks/h</th>
          <th scope="col" class="num">Warp /10⁵</th>
          <th scope="col" class="num">Weft /10⁵</th>
          <th scope="col" class="num">Perns</th>
          <th scope="col" class="num">Stood</th>
        </tr>
      </thead>
      <tbody>
        @for (row of rows(); track row.number) {
          <tr [attr.data-loom]="row.number">
            <th scope="row" class="num">{{ row.number }}</th>
            @if (row.missing) {
              <td colspan="4" class="muted">no figure, because {{ row.missing }}</td>
            } @else {
              <td class="num">{{ row.picks }}</td>
              <td class="num strong">
                {{ row.efficiency }}
                @if (row.over) {
                  <span class="flag look">over 100%</span>
                }
              </td>
              <td class="num">{{ row.picksPerHour }}</td>
              <td class="num">{{ row.warp }}</td>
            }
            <td class="num">{{ row.weft }}</td>
            <td class="num">{{ row.perns }}</td>
            <td class="num">{{ row.stood }}</td>
          </tr>
        }
      </tbody>
    </table>
  `,
  styles: `
    :host {
      display: block;
      overflow-x: auto;
    }
    table {
      width: 100%;
      border-collapse: collapse;
    }
    th,
    td {
      height: 44px;
      padding: 4px 8px;
      border-bottom: 1px solid var(--line);
      text-align: left;
    }
    thead th {
      font-size: 0.875rem;
      line-height: 1.2;
      color: var(--ink-2);
      vertical-align: bottom;
    }
    .num {
      text-align: right;
      white-space: nowrap;
    }
    thead .num {
      white-space: normal;
      font-family: inherit;
    }
    .strong {
      font-weight: 700;
    }
  `,
})
export class ShiftFigures {
  readonly looms = input.required<readonly LoomView[]>();
  private readonly clock = inject(Clock);

  protected readonly rows = computed(() =>
    this.looms().map((view) => {
      const figures = lineFigures(view.line, this.clock.tick(), noInterval);
      return {
        number: view.loom.number,
        missing: isNoFigure(figures.picks) ? noFigureSentence(figures.picks) : '',
        over: view.overPossible,
        picks: shown(figures.picks, formatCount),
        efficiency: shown(figures.efficiencyLessShed, formatPercent),
        picksPerHour: shown(figures.picksPerHour, formatCount),
        warp: shown(figures.warp.rate, formatRate),
        weft: shown(figures.weft.rate, formatRate),
        perns: formatCount(view.perns),
        stood: formatMinutes(Math.round(figures.stopMinutes)),
      };
    }),
  );
}

function shown(figure: Figure, format: (value: number) => string): string {
  return isNoFigure(figure) ? '–' : format(figure);
}
