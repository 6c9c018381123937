import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ClothStrip } from '../../ui/cloth-strip';
import { CellValue } from './cell-value';
import type { SheetFigures, SheetRow } from './sheet-rows';

/** The shift sheet at a desk and on paper: a loom line a row. */
@Component({
  selector: 'app-sheet-table',
  imports: [CellValue, ClothStrip, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './sheet-table.html',
  styleUrl: './sheet-table.scss',
})
export class SheetTable {
  readonly rows = input.required<readonly SheetRow[]>();
  /** The shed's totals; null: not all lines are shown, so no total stands beneath them. */
  readonly total = input.required<SheetFigures | null>();
  readonly caption = input.required<string>();
  /** "22:00 → 06:00". */
  readonly hours = input.required<string>();
}
