import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import type { TabletCode } from '@shared/contract/one-time';
import type { Shed } from '@shared/contract/reference';
import { outcomeOf, type Outcome } from '../../core/answer';
import { Clock } from '../../core/clock';
import { DevicesClient } from '../../core/devices-client';
import { SessionStore } from '../../core/session-store';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { TabletCodeCard } from '../../ui/tablet-code-card';

/** Makes this browser a tablet of a shed, or a code that makes another one a tablet. */
@Component({
  selector: 'app-tablet-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [
    EmptyState,
    ErrorState,
    MatButton,
    MatFormFieldModule,
    MatInput,
    ReactiveFormsModule,
    RouterLink,
    TabletCodeCard,
  ],
  templateUrl: './tablet-page.html',
})
export class TabletPage {
  private readonly session = inject(SessionStore);
  private readonly devices = inject(DevicesClient);

  protected readonly device = this.session.device;
  protected readonly isTablet = this.session.isTablet;
  protected readonly mayManage = computed(() => this.session.may('devices.manage'));
  protected readonly now = inject(Clock).tick;
  protected readonly code = signal<TabletCode | null>(null);
  protected readonly sheds = signal<readonly Shed[]>([]);
  /** The book was asked, and the mill has no shed to belong to. */
  protected readonly noShed = signal(false);
  protected readonly shedName = computed(
    () => this.sheds().find((shed) => shed.id === this.device()?.shedId)?.name ?? '',
  );
  protected readonly nameLength = LIMITS.nameLength;
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: ['', [Validators.required, Validators.maxLength(LIMITS.nameLength)]],
    shedId: ['', Validators.required],
  });

  constructor() {
    void this.loadSheds();
  }

  protected async loadSheds(): Promise<void> {
    this.failure.set('');
    const answer = await this.devices.sheds();
    if (answer.kind === 'ok') {
      this.sheds.set(answer.body.sheds);
      this.noShed.set(answer.body.sheds.length === 0);
      const only = answer.body.sheds.length === 1 ? answer.body.sheds[0] : undefined;
      if (only) this.form.controls.shedId.setValue(only.id);
      return;
    }
    const outcome = outcomeOf(answer);
    if (!outcome.ok) this.failure.set(outcome.sentence);
  }

  protected async register(): Promise<void> {
    await this.send(({ name, shedId }) => this.session.registerTablet(name, shedId));
  }

  /** For another device, which nobody has to sign in on. */
  protected async makeCode(): Promise<void> {
    await this.send(async (asked) => {
      const answer = await this.devices.newCode(asked);
      if (answer.kind === 'ok') this.code.set(answer.body);
      return outcomeOf(answer);
    });
  }

  protected finish(): void {
    this.code.set(null);
    this.form.controls.name.reset();
  }

  private async send(ask: (asked: { name: string; shedId: string }) => Promise<Outcome>): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const { name, shedId } = this.form.getRawValue();
    const outcome = await ask({ name: name.trim(), shedId });
    this.busy.set(false);
    if (!outcome.ok) this.failure.set(outcome.sentence);
  }
}
