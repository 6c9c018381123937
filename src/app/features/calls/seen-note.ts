import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Clock } from '../../core/clock';
import { formatMoment } from '../../core/dates';

/** Says that what is shown is not fresh, since when, and why. */
@Component({
  selector: 'app-seen-note',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton],
  template: `
    @if (words()) {
      <p class="flag look">{{ words() }}</p>
      <button matButton="outlined" type="button" (click)="again.emit()">Try again</button>
    }
  `,
  styles: `
    :host {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: var(--gap-1);
    }
    :host:empty {
      display: none;
    }
    button {
      min-height: 48px;
    }
  `,
})
export class SeenNote {
  /** When it was seen, by the corrected clock; null: now. */
  readonly seenAt = input.required<number | null>();
  readonly sentence = input.required<string>();
  readonly again = output();

  private readonly clock = inject(Clock);
  protected readonly words = computed(() => {
    const at = this.seenAt();
    if (this.sentence() === '') return '';
    return at === null
      ? this.sentence()
      : `As last seen here ${formatMoment(at, this.clock.tick())}. ${this.sentence()}`;
  });
}
