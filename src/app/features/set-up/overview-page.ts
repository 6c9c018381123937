import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RoomHeading } from './common/room-heading';
import { RoomList } from './room-list';

/** Set-up's first page: the next sensible step, and on a phone the list of rooms. */
@Component({
  selector: 'app-overview-page',
  imports: [RoomHeading, RoomList],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading heading="Set-up" words="What the book knows of your mill." />
    <app-room-list class="rooms" />
  `,
  styles: `
    :host {
      display: grid;
      gap: 20px;
    }
    @media (min-width: 1200px) {
      .rooms {
        display: none;
      }
    }
  `,
})
export class OverviewPage {}
