import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** What a list shows when nothing is in it: why, and (projected) the next step. */
@Component({
  selector: 'app-empty-state',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2>{{ heading() }}</h2>
    @if (words()) {
      <p class="muted">{{ words() }}</p>
    }
    <div class="next"><ng-content /></div>
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-1);
      justify-items: start;
      padding: var(--gap-3);
      border: 1px dashed var(--line-strong);
      border-radius: var(--r);
      max-width: 60ch;
    }
    .next:not(:empty) {
      display: flex;
      flex-wrap: wrap;
      gap: var(--gap-1);
      margin-top: var(--gap-1);
    }
  `,
})
export class EmptyState {
  readonly heading = input.required<string>();
  readonly words = input('');
}
