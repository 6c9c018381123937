import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { Router } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import { SessionStore } from '../../core/session-store';
import { ErrorState } from '../../ui/error-state';
import { ownTimeZone, timeZones } from './time-zones';

/** Makes the mill and its first manager, by the one-time code that the server printed. */
@Component({
  selector: 'app-first-run-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ErrorState, MatButton, MatFormFieldModule, MatInput, ReactiveFormsModule],
  templateUrl: './first-run-page.html',
})
export class FirstRunPage {
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);

  protected readonly zones = timeZones();
  protected readonly passwordLength = LIMITS.passwordLength;
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = inject(NonNullableFormBuilder).group({
    code: ['', [Validators.required, Validators.minLength(4)]],
    millName: ['', [Validators.required, Validators.maxLength(LIMITS.nameLength)]],
    timeZone: [ownTimeZone(), Validators.required],
    units: ['metric' as 'metric' | 'imperial', Validators.required],
    name: ['', [Validators.required, Validators.maxLength(LIMITS.nameLength)]],
    email: ['', [Validators.required, Validators.email]],
    password: ['', [Validators.required, Validators.minLength(LIMITS.passwordLength)]],
  });

  protected async makeMill(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const said = this.form.getRawValue();
    const outcome = await this.session.firstRun({
      ...said,
      code: said.code.trim(),
      email: said.email.trim().toLowerCase(),
    });
    this.busy.set(false);
    if (outcome.ok) await this.router.navigateByUrl('/set-up');
    else this.failure.set(outcome.sentence);
  }
}
