import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Cell, RateCell } from '@shared/sheet/sheet-rows';

/** A figure in a cell or card: the number, its interval beneath, or a dash whose reason can be read and heard. */
@Component({
  selector: 'app-cell-value',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (cell().why) {
      <span [title]="'No figure: ' + cell().why"
        ><span aria-hidden="true">–</span
        ><span class="visually-hidden">no figure: {{ cell().why }}</span></span
      >
      @if (beneath()) {
        <small class="beneath"><span class="visually-hidden">; </span>{{ beneath() }}</small>
      }
    } @else {
      @if (cell().atMost) {
        <small>at most </small>
      }
      {{ cell().text }}
      @if (beneath()) {
        <small class="beneath"><span class="visually-hidden">, 95% interval </span>{{ beneath() }}</small>
      }
    }
  `,
  styles: `
    small {
      font-size: 0.8125rem;
      font-weight: 400;
      color: var(--ink-2);
      white-space: nowrap;
    }
    .beneath {
      display: block;
    }
  `,
})
export class CellValue {
  readonly cell = input.required<Cell | RateCell>();

  protected readonly beneath = computed(() => {
    const cell = this.cell();
    return 'beneath' in cell ? cell.beneath : '';
  });
}
