import { DatePipe } from '@angular/common';
import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatProgressBar } from '@angular/material/progress-bar';
import { LIMITS } from '@shared/contract/limits';
import type { DeviceRow } from '@shared/contract/session';
import { formatMinutes } from '@shared/figures/format';
import { outcomeOf } from '../../core/answer';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { DevicesClient } from './devices-client';

/** Every registered tablet: when it was last seen, what looks odd, and the way to withdraw it. */
@Component({
  selector: 'app-devices-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [DatePipe, EmptyState, ErrorState, MatButton, MatProgressBar],
  templateUrl: './devices-list.html',
  styleUrl: './devices-list.scss',
})
export class DevicesList {
  readonly ownId = input('');

  private readonly client = inject(DevicesClient);

  protected readonly rows = signal<readonly DeviceRow[] | null>(null);
  protected readonly failure = signal('');
  /** Asked once more before a tablet is withdrawn. */
  protected readonly asked = signal<string | null>(null);
  protected readonly busy = signal(false);
  protected readonly tablets = computed(() => this.rows()?.filter((row) => row.kind === 'tablet') ?? []);

  constructor() {
    void this.load();
  }

  protected async load(): Promise<void> {
    this.failure.set('');
    const answer = await this.client.devices();
    if (answer.kind === 'ok') this.rows.set(answer.body.devices);
    else this.say(outcomeOf(answer));
  }

  protected async withdraw(id: string): Promise<void> {
    this.busy.set(true);
    const answer = await this.client.revoke(id);
    this.busy.set(false);
    this.asked.set(null);
    if (answer.kind === 'ok') await this.load();
    else this.say(outcomeOf(answer));
  }

  protected clockWords(offset: number | null): string {
    if (offset === null || Math.abs(offset) <= LIMITS.clockOffsetShown) return '';
    return `its clock is ${formatMinutes(Math.abs(offset) / 60_000)} ${offset > 0 ? 'slow' : 'fast'}`;
  }

  private say(outcome: ReturnType<typeof outcomeOf>): void {
    if (!outcome.ok) this.failure.set(outcome.sentence);
  }
}
