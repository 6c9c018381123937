import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
  untracked,
} from '@angular/core';
import { FormGroup } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { FormSaver } from '../common/form-saver';
import { keepUnsaved } from '../common/unsaved';
import { place, type PlannedLoom } from './plan';
import { PlanGrid } from './plan-grid';

/** The plan while looms are moved on it; nothing is stored before it is saved. */
@Component({
  selector: 'app-arrange-plan',
  imports: [MatButton, PlanGrid],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-plan-grid [looms]="now()" [arranging]="true" (moved)="move($event)" />
    <p role="status">{{ words() }}</p>
    @if (saver.failure()) {
      <p class="problem" role="alert">{{ saver.failure() }}</p>
    }
    <div class="acts">
      <button
        matButton="filled"
        type="button"
        [disabled]="saver.busy() || changes().length === 0"
        (click)="save()"
      >
        Save the places
      </button>
      <button matButton="outlined" type="button" [disabled]="steps().length === 0" (click)="undo()">
        Back one step
      </button>
      <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
    </div>
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
    }
  `,
  styleUrl: '../common/form.scss',
})
export class ArrangePlan {
  readonly looms = input.required<readonly Loom[]>();
  readonly done = output<void>();
  readonly left = output<void>();

  protected readonly saver = inject(FormSaver);
  /** The plan after each move, the last at the end. */
  protected readonly steps = signal<readonly (readonly PlannedLoom[])[]>([]);
  private readonly before = computed<readonly PlannedLoom[]>(() => this.looms());
  protected readonly now = computed(() => this.steps().at(-1) ?? this.before());
  protected readonly changes = computed(() => {
    const before = new Map(this.before().map((loom) => [loom.id, loom]));
    return this.now().filter((loom) => {
      const was = before.get(loom.id);
      return was?.row !== loom.row || was.position !== loom.position || was.alley !== loom.alley;
    });
  });
  protected readonly words = computed(() => {
    const count = this.changes().length;
    if (count === 0) return 'Nothing is moved yet.';
    return `${count === 1 ? '1 loom is' : `${count} looms are`} moved. It is not saved yet.`;
  });

  constructor() {
    keepUnsaved(() => untracked(this.changes).length > 0);
  }

  protected move({
    id,
    ...to
  }: {
    readonly id: string;
    readonly row: number;
    readonly position: number;
  }): void {
    this.steps.update((steps) => [...steps, place(this.now(), id, to)]);
  }

  protected undo(): void {
    this.steps.update((steps) => steps.slice(0, -1));
  }

  protected async save(): Promise<void> {
    const looms = this.changes().map(({ id, number, row, position, alley }) => ({
      id,
      number,
      row,
      position,
      alley,
    }));
    const ids = await this.saver.save(new FormGroup({}), 'PATCH', '/looms', () => ({ looms }));
    if (!ids) return;
    this.steps.set([]);
    this.done.emit();
  }
}
