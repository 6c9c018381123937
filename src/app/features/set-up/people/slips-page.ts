import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { PIN_SLIPS_AT_ONCE, type PinSlip } from '@shared/contract/one-time';
import { outcomeOf } from '../../../core/answer';
import { EmptyState } from '../../../ui/empty-state';
import { ErrorState } from '../../../ui/error-state';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { keepUnsaved } from '../common/unsaved';
import { PeopleStore } from './people-store';

/** New PINs on slips to cut apart. They are on this page alone, until it is left. */
@Component({
  selector: 'app-slips-page',
  imports: [EmptyState, ErrorState, MatButton, MatIcon, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './slips-page.html',
  styleUrls: ['../common/room.scss', './slips-page.scss'],
})
export class SlipsPage {
  private readonly people = inject(PeopleStore);
  private readonly setUp = inject(SetUpStore);

  protected readonly most = PIN_SLIPS_AT_ONCE;
  protected readonly mill = computed(() => this.setUp.mill()?.name ?? '');
  protected readonly slips = signal<readonly PinSlip[]>([]);
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  private readonly printed = signal(false);
  private readonly chosen = computed(() => {
    const ids = this.people.forSlips();
    return (this.people.load().value ?? []).filter(({ id }) => ids.has(id));
  });
  protected readonly ready = computed(() =>
    this.chosen().filter(({ worksNumber, disabledAt }) => worksNumber !== null && disabledAt === null),
  );
  /** Chosen, but no PIN is of use to them. */
  protected readonly without = computed(() =>
    this.chosen()
      .filter((person) => !this.ready().includes(person))
      .map(({ name }) => name)
      .join(', '),
  );

  constructor() {
    if (this.people.load().value === null) void this.people.reload();
    // Left before printing, the new PINs are lost and the old ones are void.
    keepUnsaved(() => this.slips().length > 0 && !this.printed());
  }

  protected async make(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const answer = await this.people.makeSlips(this.ready().map(({ id }) => id));
    this.busy.set(false);
    const outcome = outcomeOf(answer);
    if (!outcome.ok) this.failure.set(outcome.sentence);
    if (answer.kind !== 'ok') return;
    this.slips.set(answer.body.slips);
    this.printed.set(false);
    this.people.forSlips.set(new Set());
    await this.people.reload();
  }

  protected print(): void {
    this.printed.set(true);
    globalThis.print();
  }
}
