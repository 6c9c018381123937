import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatIcon } from '@angular/material/icon';
import { markedStyle } from '../../ui/chart/chart-series';
import { LineSwatch } from '../../ui/chart/line-swatch';
import type { WeeksRow, WeeksTable } from './weeks-rows';
import type { WeeksView } from './weeks-view';

/** The weeks on a phone: a loom (or row) a card, its last whole week large, the weeks beneath. */
@Component({
  selector: 'app-weeks-cards',
  imports: [LineSwatch, MatIcon],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <ul class="cards">
      @for (card of cards(); track card.row.key) {
        <li class="card">
          <div class="top">
            <h3>
              <small>{{ card.word }}</small> {{ card.row.label }}
            </h3>
            <p class="muted">{{ card.row.cloth }}</p>
            <p class="now">
              @if (card.now; as now) {
                @if (now.why) {
                  <span class="small muted">no figure: {{ now.why }}</span>
                } @else {
                  <b class="num">{{ now.text }}</b>
                  @if (now.interval) {
                    <small>{{ now.interval }}</small>
                  }
                  @if (now.coverage) {
                    <small>{{ now.coverage }}</small>
                  }
                }
              }
            </p>
            @if (card.word) {
              <button
                type="button"
                [attr.aria-pressed]="card.style !== null"
                [attr.aria-label]="'Mark ' + card.word.toLowerCase() + ' ' + card.row.label + ' in the chart'"
                (click)="toggled.emit(card.row.key)"
              >
                @if (card.style; as style) {
                  <app-line-swatch [style]="style" />
                } @else {
                  <mat-icon svgIcon="weeks" aria-hidden="true" />
                }
              </button>
            }
          </div>
          <ol>
            @for (cell of card.row.cells; track $index) {
              <li>
                <span class="muted"
                  >{{ table().columns[$index].label
                  }}{{ table().columns[$index].soFar ? ', so far' : '' }}</span
                >
                <span class="num">{{ cell.text }}</span>
                @if (cell.why) {
                  <span class="visually-hidden">no figure: {{ cell.why }}</span>
                }
              </li>
            }
          </ol>
        </li>
      }
    </ul>
  `,
  styles: `
    ul,
    ol {
      padding: 0;
      list-style: none;
    }
    .cards {
      display: grid;
      gap: var(--gap-1);
    }
    .card {
      display: grid;
      gap: 10px;
      padding: 12px var(--gap-2);
    }
    .top {
      display: grid;
      grid-template-columns: auto 1fr auto 48px;
      gap: 4px 12px;
      align-items: center;
    }
    h3 {
      font-size: 1.5rem;
      line-height: 1.1;
    }
    small {
      font-size: 0.875rem;
      font-weight: 400;
      color: var(--ink-2);
    }
    .now {
      text-align: right;
    }
    .now b {
      font-size: 1.5rem;
    }
    .now small {
      display: block;
    }
    ol {
      display: grid;
      grid-template-columns: repeat(auto-fill, minmax(62px, 1fr));
      gap: 6px 10px;
    }
    ol li {
      display: grid;
      align-content: start;
      font-size: 0.9375rem;
    }
    ol .muted {
      font-size: 0.8125rem;
    }
    button {
      display: grid;
      place-items: center;
      width: var(--touch);
      height: var(--touch);
      padding: 0;
      color: var(--ink-2);
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      background: none;
      cursor: pointer;
    }
    button[aria-pressed='true'] {
      background: var(--flax-soft);
    }
  `,
})
export class WeeksCards {
  readonly table = input.required<WeeksTable>();
  readonly rows = input.required<readonly WeeksRow[]>();
  readonly view = input.required<WeeksView>();
  readonly marked = input.required<readonly string[]>();
  readonly toggled = output<string>();

  protected readonly cards = computed(() => {
    const { total, lastWhole } = this.table();
    const word = this.view().by === 'row' ? 'Row' : 'Loom';
    return [total, ...this.rows()].map((row) => {
      const place = this.marked().indexOf(row.key);
      return {
        row,
        word: row === total ? '' : word,
        now: row.cells[lastWhole] ?? null,
        style: place < 0 ? null : markedStyle(place),
      };
    });
  });
}
