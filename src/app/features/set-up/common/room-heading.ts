import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** The head of a room: what it is, what it is for, and (projected) what can be done. */
@Component({
  selector: 'app-room-heading',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div>
      <h1>{{ heading() }}</h1>
      @if (words()) {
        <p class="muted">{{ words() }}</p>
      }
    </div>
    <div class="acts no-print"><ng-content /></div>
  `,
  styles: `
    :host {
      display: flex;
      flex-wrap: wrap;
      gap: 12px 24px;
      align-items: flex-start;
      justify-content: space-between;
    }
    p {
      max-width: 70ch;
      margin-top: 4px;
    }
    .acts {
      display: flex;
      flex-wrap: wrap;
      gap: 8px;
    }
  `,
})
export class RoomHeading {
  readonly heading = input.required<string>();
  readonly words = input('');
}
