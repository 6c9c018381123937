import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink, RouterLinkActive } from '@angular/router';
import { SetUpStore } from './common/set-up-store';
import { ROOM_GROUPS } from './rooms';

/** The rooms of set-up, each with how much is in it and what it lacks. */
@Component({
  selector: 'app-room-list',
  imports: [RouterLink, RouterLinkActive],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @for (group of groups(); track group.heading) {
      <section>
        <h2>{{ group.heading }}</h2>
        <ul>
          @for (room of group.rooms; track room.path) {
            <li>
              <a [routerLink]="['/set-up', room.path]" routerLinkActive="here" ariaCurrentWhenActive="page">
                <span>{{ room.label }}</span>
                @if (room.missing) {
                  <span class="flag look">{{ room.missing }}</span>
                } @else if (room.count) {
                  <span class="small muted">{{ room.count }}</span>
                }
              </a>
            </li>
          }
        </ul>
      </section>
    }
  `,
  styleUrl: './room-list.scss',
})
export class RoomList {
  private readonly store = inject(SetUpStore);
  protected readonly groups = computed(() => {
    const setUp = this.store.setUp();
    return ROOM_GROUPS.map(({ heading, rooms }) => ({
      heading,
      rooms: rooms.map(({ path, label, count, missing }) => ({
        path,
        label,
        count: setUp ? count(setUp) : '',
        missing: setUp ? missing(setUp) : '',
      })),
    }));
  });
}
