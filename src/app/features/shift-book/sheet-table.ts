import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ClothStrip } from '../../ui/cloth-strip';
import { CellValue } from './cell-value';
import type { SheetFigures, SheetRow } from '@shared/sheet/sheet-rows';

/** More flags than this would make a row as tall as three. */
const FLAGS_SHOWN = 2;

/** The shift sheet at a desk and on paper: a loom line a row. */
@Component({
  selector: 'app-sheet-table',
  imports: [CellValue, ClothStrip, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './sheet-table.html',
  styleUrl: './sheet-table.scss',
})
export class SheetTable {
  protected readonly flagsShown = FLAGS_SHOWN;
  readonly rows = input.required<readonly SheetRow[]>();
  /** A tint on every line would mark none: then their flags alone stand out. */
  protected readonly allLook = computed(() => this.rows().every((row) => row.needsLook));
  /** The shed's totals; null: not all lines are shown, so no total stands beneath them. */
  readonly total = input.required<SheetFigures | null>();
  readonly caption = input.required<string>();
  /** "22:00 → 06:00". */
  readonly hours = input.required<string>();
}
