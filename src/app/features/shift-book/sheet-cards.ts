import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ClothStrip } from '../../ui/cloth-strip';
import { CellValue } from './cell-value';
import type { SheetRow } from '@shared/sheet/sheet-rows';

/** The shift sheet where there is no room for a table: a loom line a card. */
@Component({
  selector: 'app-sheet-cards',
  imports: [CellValue, ClothStrip, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <ul>
      @for (row of rows(); track row.loom) {
        <li class="card" [class.look]="row.needsLook && !allLook()">
          <div class="top">
            <h3>
              <a [routerLink]="['loom', row.loomId]"
                ><span class="visually-hidden">Loom </span>{{ row.loom }}</a
              >
            </h3>
            <p class="what">
              {{ row.cloth || 'no cloth' }}<span>{{ row.weaver || 'no weaver' }}</span>
            </p>
            <p class="efficiency">
              <span class="visually-hidden">Efficiency </span
              ><app-cell-value [cell]="row.figures.efficiency" />
            </p>
          </div>
          <app-cloth-strip [line]="row.strip" [height]="24" [label]="'Loom ' + row.loom" />
          @if (row.flags.length > 0) {
            <p class="flags">
              @for (flag of row.flags; track flag.words) {
                <span class="flag" [class.look]="flag.look">{{ flag.words }}</span>
              }
            </p>
          }
          <dl>
            <div>
              <dt>Picks</dt>
              <dd class="num"><app-cell-value [cell]="row.figures.picks" /></dd>
            </div>
            <div>
              <dt>Picks/h</dt>
              <dd class="num"><app-cell-value [cell]="row.figures.picksPerHour" /></dd>
            </div>
            <div>
              <dt>Warp/10⁵</dt>
              <dd class="num"><app-cell-value [cell]="row.figures.warp" /></dd>
            </div>
            <div>
              <dt>Weft/10⁵</dt>
              <dd class="num"><app-cell-value [cell]="row.figures.weft" /></dd>
            </div>
            <div class="lost">
              <dt>Minutes lost</dt>
              <dd>
                <span class="num"><app-cell-value [cell]="row.figures.measured" /></span> timed ·
                <span class="num"><app-cell-value [cell]="row.figures.estimated" /></span> estimated ·
                <span class="num"><app-cell-value [cell]="row.figures.unaccounted" /></span> not logged
              </dd>
            </div>
          </dl>
        </li>
      }
    </ul>
  `,
  styles: `
    ul {
      display: grid;
      grid-template-columns: repeat(auto-fill, minmax(min(100%, 330px), 1fr));
      gap: var(--gap-1);
      padding: 0;
      list-style: none;
    }
    li {
      display: grid;
      align-content: start;
      gap: var(--gap-1);
      padding: 12px var(--gap-2);
    }
    li.look {
      background: color-mix(in srgb, var(--weld-soft) 55%, var(--surface));
    }
    .top {
      display: grid;
      grid-template-columns: auto 1fr auto;
      gap: 12px;
      align-items: start;
    }
    h3 {
      font-size: 1.75rem;
      line-height: 1;
    }
    h3 a {
      display: grid;
      place-items: center;
      min-width: var(--touch);
      min-height: var(--touch);
      margin: -8px 0 -8px -8px;
      color: inherit;
    }
    .what span {
      display: block;
    }
    .what span,
    dt {
      font-size: 0.875rem;
      color: var(--ink-2);
    }
    .efficiency {
      font-size: 1.375rem;
      line-height: 1.1;
      font-weight: 700;
      text-align: right;
    }
    .flags {
      display: flex;
      flex-wrap: wrap;
      gap: 6px;
    }
    dl {
      display: grid;
      grid-template-columns: repeat(4, auto);
      gap: var(--gap-1) 12px;
      justify-content: space-between;
    }
    .lost {
      grid-column: 1 / -1;
    }
    @container (max-width: 340px) {
      dl {
        grid-template-columns: repeat(2, auto);
      }
    }
  `,
})
export class SheetCards {
  readonly rows = input.required<readonly SheetRow[]>();
  /** A tint on every line would mark none: then their flags alone stand out. */
  protected readonly allLook = computed(() => this.rows().every((row) => row.needsLook));
}
