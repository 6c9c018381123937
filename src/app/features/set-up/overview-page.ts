import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { deviceListSchema, peopleListSchema } from '@shared/contract/session';
import { ApiClient } from '../../core/api-client';
import { API } from '../../core/api-paths';
import { Clock } from '../../core/clock';
import { formatMoment } from '../../core/dates';
import { OfflineBook } from '../../offline/offline-book';
import { ShedBook } from '../../offline/shed-book';
import { RoomHeading } from './common/room-heading';
import { SetUpStore } from './common/set-up-store';
import { stepsOf } from './next-steps';
import { RoomList } from './room-list';
import { loomsInUse } from './rooms';

/** Set-up's first page: the way from an empty mill to its first shift, and on a phone the list of rooms. */
@Component({
  selector: 'app-overview-page',
  imports: [MatButton, MatIcon, RoomHeading, RoomList, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './overview-page.html',
  styleUrl: './overview-page.scss',
})
export class OverviewPage {
  private readonly store = inject(SetUpStore);
  private readonly api = inject(ApiClient);
  private readonly clock = inject(Clock);
  private readonly book = inject(OfflineBook);
  private readonly shedBook = inject(ShedBook);

  protected readonly mill = computed(() => this.store.known().mill);
  private readonly weavers = signal<number | null>(null);
  private readonly tablets = signal<number | null>(null);
  private readonly fitted = computed(() => {
    const now = this.clock.tick();
    return loomsInUse(this.store.known()).filter((loom) => this.shedBook.clothOn(loom.id, now) !== null)
      .length;
  });
  private readonly nextShift = computed(() => {
    const now = this.clock.tick();
    const next = this.store
      .known()
      .shifts.filter((shift) => shift.startsAt > now)
      .sort((a, b) => a.startsAt - b.startsAt)[0];
    return next ? `${formatMoment(next.startsAt, now, this.store.timeZone())} with “${next.name}”` : '';
  });
  private readonly hasBegun = computed(() => {
    const now = this.clock.tick();
    return (
      this.book.currentShift() !== null || this.store.known().shifts.some((shift) => shift.startsAt <= now)
    );
  });
  /** Null: people and tablets are not counted yet, and a step must not be asked for that is done. */
  protected readonly steps = computed(() => {
    const [weavers, tablets] = [this.weavers(), this.tablets()];
    if (weavers === null || tablets === null) return null;
    return stepsOf(this.store.known(), {
      weavers,
      tablets,
      fitted: this.fitted(),
      nextShift: this.nextShift(),
      hasBegun: this.hasBegun(),
    });
  });
  protected readonly next = computed(() => this.steps()?.find((step) => !step.done) ?? null);
  protected readonly left = computed(() => this.steps()?.filter((step) => !step.done).length ?? 0);

  constructor() {
    void this.count();
  }

  private async count(): Promise<void> {
    const [people, devices] = await Promise.all([
      this.api.get('/api/people', peopleListSchema),
      this.api.get(API.devices, deviceListSchema),
    ]);
    this.weavers.set(
      people.kind === 'ok'
        ? people.body.people.filter((one) => one.disabledAt === null && one.roles.includes('weaver')).length
        : 0,
    );
    this.tablets.set(
      devices.kind === 'ok'
        ? devices.body.devices.filter((one) => one.kind === 'tablet' && !one.revoked).length
        : 0,
    );
  }
}
