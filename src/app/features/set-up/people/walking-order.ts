import { CdkDrag, CdkDragHandle, CdkDropList, type CdkDragDrop } from '@angular/cdk/drag-drop';
import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  model,
  signal,
} from '@angular/core';
import { MatIconButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import type { Loom } from '@shared/contract/reference';
import { moved } from './moved';

/**
 * The looms somebody minds, in the order in which he walks them. By buttons and keys; by drag too, where a finger or a
 * mouse likes it better.
 */
@Component({
  selector: 'app-walking-order',
  imports: [CdkDrag, CdkDragHandle, CdkDropList, MatIcon, MatIconButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './walking-order.html',
  styleUrl: './walking-order.scss',
})
export class WalkingOrder {
  /** Ids in walking order. */
  readonly order = model.required<readonly string[]>();
  /** Looms that can be in it, in use. */
  readonly looms = input.required<readonly Loom[]>();
  /** What a loom is called where several sheds have the same number. */
  readonly sheds = input<readonly { readonly id: string; readonly name: string }[]>([]);

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  /** What was done last, for who does not see it. */
  protected readonly said = signal('');

  protected readonly walked = computed(() =>
    this.order().map((id) => ({ id, name: this.nameOf(this.looms().find((loom) => loom.id === id)) })),
  );
  protected readonly left = computed(() =>
    this.looms()
      .filter(({ id }) => !this.order().includes(id))
      .sort((a, b) => a.shedId.localeCompare(b.shedId) || a.number - b.number)
      .map((loom) => ({ id: loom.id, name: this.nameOf(loom) })),
  );

  protected add(id: string): void {
    if (!id) return;
    this.order.set([...this.order(), id]);
    this.said.set(`${this.nameAt(id)} is now last, ${this.order().length} looms.`);
  }

  protected remove(id: string): void {
    this.said.set(`${this.nameAt(id)} is out of the set.`);
    this.order.set(this.order().filter((each) => each !== id));
  }

  /** `by`: places towards the end, or, negative, towards the beginning. The focus goes with the loom. */
  protected shift(id: string, by: number): void {
    const from = this.order().indexOf(id);
    const to = from + by;
    if (to < 0 || to >= this.order().length) return;
    this.order.set(moved(this.order(), from, to));
    this.said.set(`${this.nameAt(id)} is now ${to + 1} of ${this.order().length}.`);
    const which = by < 0 ? 'up' : 'down';
    setTimeout(() => {
      const rows = [...this.host.nativeElement.querySelectorAll<HTMLElement>('[data-loom]')];
      const row = rows.find((one) => one.dataset['loom'] === id);
      const wanted = row?.querySelector<HTMLButtonElement>(`[data-way="${which}"]:not(:disabled)`);
      (wanted ?? row?.querySelector<HTMLButtonElement>('button:not(:disabled)'))?.focus();
    });
  }

  protected drop({ previousIndex, currentIndex }: CdkDragDrop<unknown>): void {
    this.order.set(moved(this.order(), previousIndex, currentIndex));
  }

  protected inOrder(): void {
    const number = (id: string) => this.looms().find((loom) => loom.id === id)?.number ?? 0;
    this.order.set([...this.order()].sort((a, b) => number(a) - number(b)));
    this.said.set('The set goes by loom number now.');
  }

  private nameAt(id: string): string {
    return this.nameOf(this.looms().find((loom) => loom.id === id));
  }

  private nameOf(loom: Loom | undefined): string {
    if (!loom) return 'A loom no longer in use';
    const shed =
      this.sheds().length > 1 ? this.sheds().find(({ id }) => id === loom.shedId)?.name : undefined;
    return `Loom ${loom.number}${shed ? `, ${shed}` : ''}`;
  }
}
