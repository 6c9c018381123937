import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { forgottenAnswerSchema } from '@shared/contract/one-time';
import { outcomeOf } from '../../core/answer';
import { ApiClient } from '../../core/api-client';
import { API } from '../../core/api-paths';
import { ErrorState } from '../../ui/error-state';

/** Asks for a letter with a link for a new password. It says the same whether somebody has the address or not. */
@Component({
  selector: 'app-forgotten-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ErrorState, MatButton, MatFormFieldModule, MatInput, ReactiveFormsModule, RouterLink],
  template: `
    <div class="door">
      <h1>Forgotten password</h1>
      @if (asked()) {
        <div role="status">
          <p>
            If somebody here has the address <strong>{{ asked() }}</strong>, a letter is on its way to it. Its
            link works once, within an hour.
          </p>
        </div>
        <p class="muted">
          No letter after some minutes? Look among the unwanted ones, or ask the manager, who can send one or
          see why none goes out.
        </p>
      } @else {
        <p>You get a letter with a link for a new password. For a new PIN ask the foreman or the manager.</p>
        <form [formGroup]="form" (ngSubmit)="ask()" novalidate>
          <mat-form-field appearance="outline">
            <mat-label>E-mail</mat-label>
            <input matInput type="email" formControlName="email" autocomplete="username" />
            <mat-error>An e-mail address, such as name&#64;mill.example.</mat-error>
          </mat-form-field>
          @if (failure()) {
            <app-error-state [words]="failure()" />
          }
          <button matButton="filled" class="go" type="submit" [disabled]="busy()">
            {{ busy() ? 'One moment …' : 'Send the letter' }}
          </button>
        </form>
      }
      <a matButton routerLink="/sign-in">Back to sign-in</a>
    </div>
  `,
  styles: `
    strong {
      overflow-wrap: anywhere;
    }
  `,
})
export class ForgottenPage {
  private readonly api = inject(ApiClient);

  /** The address that was asked for; empty: none yet. */
  protected readonly asked = signal('');
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.email]],
  });

  protected async ask(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const { email } = this.form.getRawValue();
    const answer = await this.api.bare(API.forgotten, forgottenAnswerSchema, { email });
    this.busy.set(false);
    const outcome = outcomeOf(answer);
    if (outcome.ok) this.asked.set(email.trim());
    else this.failure.set(outcome.sentence);
  }
}
