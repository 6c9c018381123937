import { CdkDrag, type CdkDragEnd } from '@angular/cdk/drag-drop';
import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { planOf, type PlanCell, type PlannedLoom } from './plan';

/**
 * The shed's floor plan. Looms are chosen by a tap; while it is being arranged they are moved by drag, or picked by a
 * tap (Enter) and placed by another; arrow keys walk over the floor.
 */
@Component({
  selector: 'app-plan-grid',
  imports: [CdkDrag],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './plan-grid.html',
  styleUrl: './plan-grid.scss',
})
export class PlanGrid {
  readonly looms = input.required<readonly PlannedLoom[]>();
  readonly selected = input<ReadonlySet<string>>(new Set());
  readonly arranging = input(false);
  /** Only to look at, e.g. looms that are about to be added. */
  readonly preview = input(false);
  readonly toggled = output<string>();
  readonly moved = output<{ readonly id: string; readonly row: number; readonly position: number }>();

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  protected readonly picked = signal<PlannedLoom | null>(null);
  protected readonly rows = computed(() => planOf(this.looms(), this.arranging()));
  protected readonly places = computed(() => this.rows()[0]?.cells.length ?? 0);
  protected readonly words = computed(() => {
    const picked = this.picked();
    if (!this.arranging()) return '';
    if (picked) return `Loom ${picked.number} is picked. Choose its place; Escape puts it back.`;
    return 'Drag a loom to its place, or choose it and then the place. On a loom’s place the two change places.';
  });

  protected choose(cell: PlanCell): void {
    if (!this.arranging()) {
      if (cell.loom) this.toggled.emit(cell.loom.id);
      return;
    }
    const picked = this.picked();
    if (!picked) {
      this.picked.set(cell.loom);
      return;
    }
    this.picked.set(null);
    this.moved.emit({ id: picked.id, row: cell.row, position: cell.position });
  }

  /** Finds the place under the pointer; nowhere: the loom goes back. */
  protected drop(event: CdkDragEnd, loom: PlannedLoom): void {
    const { x, y } = event.dropPoint;
    const own = event.source.element.nativeElement;
    const under = document.elementsFromPoint(x, y).find((one) => one !== own && one.closest('[data-cell]'));
    const key = under?.closest('[data-cell]')?.getAttribute('data-cell');
    event.source.reset();
    this.picked.set(null);
    const [row, position] = (key ?? '').split('/').map(Number);
    if (row && position) this.moved.emit({ id: loom.id, row, position });
  }

  protected walk(event: KeyboardEvent, cell: PlanCell): void {
    if (event.key === 'Escape') this.picked.set(null);
    const steps: Readonly<Record<string, readonly [number, number]>> = {
      ArrowUp: [-1, 0],
      ArrowDown: [1, 0],
      ArrowLeft: [0, -1],
      ArrowRight: [0, 1],
    };
    const step = steps[event.key];
    if (!step) return;
    event.preventDefault();
    const rows = this.rows();
    const at = rows.findIndex((row) => row.row === cell.row);
    for (let i = 1; i <= rows.length + this.places(); i++) {
      const row = rows[at + step[0] * i];
      const key = `${row?.row ?? 0}/${cell.position + step[1] * i}`;
      const button = this.host.nativeElement.querySelector<HTMLElement>(`button[data-cell="${key}"]`);
      if (button) {
        button.focus();
        return;
      }
    }
  }
}
