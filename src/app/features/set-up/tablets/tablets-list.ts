import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { LIMITS } from '@shared/contract/limits';
import type { DeviceRow } from '@shared/contract/session';
import { formatMinutes } from '@shared/figures/format';
import { outcomeOf, type Answer } from '../../../core/answer';
import { Clock } from '../../../core/clock';
import { formatMoment } from '../../../core/dates';
import { DevicesClient } from '../../../core/devices-client';
import { SessionStore } from '../../../core/session-store';
import { EmptyState } from '../../../ui/empty-state';
import { ErrorState } from '../../../ui/error-state';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { renameForm } from './tablet-form';

/** Every registered tablet: when it was last seen, what looks odd, its name, and the way to withdraw it. */
@Component({
  selector: 'app-tablets-list',
  imports: [EmptyState, ErrorState, MatButton, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './tablets-list.html',
  styleUrl: './tablets-list.scss',
})
export class TabletsList {
  readonly devices = input.required<readonly DeviceRow[]>();
  readonly sheds = input.required<readonly { readonly id: string; readonly name: string }[]>();
  readonly changed = output<void>();

  private readonly client = inject(DevicesClient);
  private readonly setUp = inject(SetUpStore);
  private readonly clock = inject(Clock);

  protected readonly own = inject(SessionStore).device;
  protected readonly failure = signal('');
  /** Asked once more before a tablet is withdrawn. */
  protected readonly asked = signal<string | null>(null);
  protected readonly renaming = signal<{ id: string; form: ReturnType<typeof renameForm> } | null>(null);
  protected readonly busy = signal(false);
  /** In use first, then the withdrawn. */
  protected readonly tablets = computed(() =>
    this.devices()
      .filter(({ kind }) => kind === 'tablet')
      .sort((a, b) => Number(a.revoked) - Number(b.revoked) || a.name.localeCompare(b.name, 'en')),
  );

  protected shedName(id: string | null): string {
    return this.sheds().find((shed) => shed.id === id)?.name ?? '';
  }

  protected seen({ lastSeenAt, registeredAt }: DeviceRow): string {
    const moment = (at: number) => formatMoment(at, this.clock.tick(), this.setUp.timeZone());
    return lastSeenAt === null
      ? `registered ${moment(registeredAt)}, not seen since`
      : `last seen ${moment(lastSeenAt)}`;
  }

  protected clockWords(offset: number | null): string {
    if (offset === null || Math.abs(offset) <= LIMITS.clockOffsetShown) return '';
    return `its clock is ${formatMinutes(Math.abs(offset) / 60_000)} ${offset > 0 ? 'slow' : 'fast'}`;
  }

  protected rename({ id, name }: DeviceRow): void {
    const others = () =>
      this.tablets()
        .filter((each) => each.id !== id && !each.revoked)
        .map((each) => each.name);
    this.renaming.set({ id, form: renameForm(name, others) });
  }

  protected async keepName(): Promise<void> {
    const { id, form } = this.renaming() ?? {};
    if (id === undefined || !form) return;
    form.markAllAsTouched();
    if (form.invalid) return;
    await this.send(() => this.client.rename(id, form.getRawValue().name.trim()));
  }

  protected async withdraw(id: string): Promise<void> {
    await this.send(() => this.client.revoke(id));
  }

  private async send(ask: () => Promise<Answer<unknown>>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const outcome = outcomeOf(await ask());
    this.busy.set(false);
    this.asked.set(null);
    if (outcome.ok) this.renaming.set(null);
    else this.failure.set(outcome.sentence);
    this.changed.emit();
  }
}
