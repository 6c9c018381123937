import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { PernWay } from '../../offline/personal-ways';

const WAYS: readonly { readonly way: PernWay; readonly words: string }[] = [
  { way: 'each-loom', words: 'Count each loom' },
  { way: 'whole-set', words: 'Count the set' },
  { way: 'taps', words: 'I tap each pern' },
];

/** How this weaver logs perns on this device, from now on. */
@Component({
  selector: 'app-pern-way-choice',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <fieldset>
      <legend>Perns from now on</legend>
      @for (one of ways; track one.way) {
        <label>
          <input type="radio" name="pern-way" [checked]="one.way === way()" (change)="chosen.emit(one.way)" />
          {{ one.words }}
        </label>
      }
    </fieldset>
  `,
  styles: `
    fieldset {
      display: flex;
      flex-wrap: wrap;
      gap: 0 20px;
      margin: 0;
      padding: 0;
      border: 0;
    }
    legend {
      padding: 0;
      font-size: 0.9375rem;
      color: var(--ink-2);
    }
    label {
      display: flex;
      align-items: center;
      gap: 10px;
      min-height: var(--touch);
    }
    input {
      width: 22px;
      height: 22px;
      accent-color: var(--flax);
    }
  `,
})
export class PernWayChoice {
  readonly way = input.required<PernWay>();
  readonly chosen = output<PernWay>();

  protected readonly ways = WAYS;
}
