import { DOCUMENT } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, effect, inject, signal } from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { ChoiceField } from '../common/choice-field';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';

interface Label {
  readonly id: string;
  readonly number: number;
  readonly address: string;
  /** The code as one path on a grid of `size` modules, quiet zone and all. */
  readonly path: string;
  readonly size: number;
}

/** A label for each loom: its number, and a code that opens its page. Printed black on white, A4. */
@Component({
  selector: 'app-labels-page',
  imports: [ChoiceField, EmptyState, MatButton, MatIcon, ReactiveFormsModule, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './labels-page.html',
  styleUrl: './labels-page.scss',
})
export class LabelsPage {
  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly document = inject(DOCUMENT);

  protected readonly sheds = computed(() =>
    this.store.known().sheds.map((shed) => ({ value: shed.id, words: shed.name })),
  );
  protected readonly shed = new FormControl(this.store.known().sheds[0]?.id ?? '', { nonNullable: true });
  private readonly shedId = toSignal(this.shed.valueChanges, { initialValue: this.shed.value });
  protected readonly shedName = computed(
    () => this.store.known().sheds.find((shed) => shed.id === this.shedId())?.name ?? '',
  );
  protected readonly looms = computed(() =>
    this.store
      .known()
      .looms.filter(
        (loom) =>
          loom.shedId === this.shedId() && (loom.until === null || loom.until > this.clock.correctedNow()),
      )
      .sort((a, b) => a.number - b.number),
  );
  protected readonly labels = signal<readonly Label[]>([]);
  protected readonly failed = signal(false);

  constructor() {
    effect(() => void this.draw(this.looms().map(({ id, number }) => ({ id, number }))));
  }

  protected print(): void {
    this.document.defaultView?.print();
  }

  private async draw(looms: readonly { readonly id: string; readonly number: number }[]): Promise<void> {
    try {
      const { create } = (await import('qrcode')).default;
      const origin = this.document.location.origin;
      this.labels.set(
        looms.map(({ id, number }) => {
          const address = `${origin}/l/${number}`;
          const { modules } = create(address, { errorCorrectionLevel: 'Q' });
          return { id, number, address, ...pathOf(modules) };
        }),
      );
      this.failed.set(false);
    } catch {
      // The part of the application that draws codes could not be fetched.
      this.failed.set(true);
    }
  }
}

/** A quiet zone of four modules all round, as the code's standard (ISO/IEC 18004) asks. */
const QUIET = 4;

function pathOf(modules: { readonly size: number; get(row: number, column: number): number | boolean }): {
  path: string;
  size: number;
} {
  let path = '';
  for (let row = 0; row < modules.size; row++)
    for (let column = 0; column < modules.size; column++)
      if (modules.get(row, column)) path += `M${column + QUIET} ${row + QUIET}h1v1h-1z`;
  return { path, size: modules.size + 2 * QUIET };
}
