import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { plainCode, TABLET_CODE_LENGTH } from '@shared/contract/one-time';
import { SessionStore } from '../../core/session-store';
import { ErrorState } from '../../ui/error-state';

/** Makes this browser a tablet by a code that somebody made in set-up: typed, or brought by the square code. */
@Component({
  selector: 'app-tablet-code-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ErrorState, MatButton, MatFormFieldModule, MatInput, ReactiveFormsModule, RouterLink],
  template: `
    <div class="door">
      <h1>Make this a tablet</h1>
      @if (isTablet()) {
        <p>
          This browser is the tablet “{{ device()?.name }}” already. Weavers and tacklers sign in with works
          number and PIN.
        </p>
        <a matButton="filled" class="go" routerLink="/sign-in">To sign-in</a>
      } @else {
        <p>
          The manager’s page Tablets, or the foreman’s, makes a code for this. Afterwards people sign in here
          with works number and PIN.
        </p>
        <form [formGroup]="form" (ngSubmit)="register()" novalidate>
          <mat-form-field appearance="outline" subscriptSizing="dynamic">
            <mat-label>Code</mat-label>
            <input
              matInput
              class="num code"
              formControlName="code"
              autocomplete="one-time-code"
              autocapitalize="characters"
              spellcheck="false"
              placeholder="K7PM-3XQD"
            />
            <mat-hint>Eight letters and digits; it works once, within 15 minutes.</mat-hint>
            <mat-error>{{ trouble() }}</mat-error>
          </mat-form-field>
          @if (failure()) {
            <app-error-state [words]="failure()" />
          }
          <button matButton="filled" class="go" type="submit" [disabled]="busy()">
            {{ busy() ? 'One moment …' : 'Make it a tablet' }}
          </button>
        </form>
        <a matButton routerLink="/sign-in">Back to sign-in</a>
      }
    </div>
  `,
  styles: `
    .code {
      letter-spacing: 0.06em;
      text-transform: uppercase;
    }
  `,
})
export class TabletCodePage {
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);

  protected readonly isTablet = this.session.isTablet;
  protected readonly device = this.session.device;
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = new FormGroup({
    code: new FormControl(inject(ActivatedRoute).snapshot.fragment ?? '', {
      nonNullable: true,
      validators: ({ value }) => (codeTrouble(String(value)) ? { code: true } : null),
    }),
  });

  protected trouble(): string {
    return codeTrouble(this.form.getRawValue().code);
  }

  protected async register(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const outcome = await this.session.registerByCode(this.form.getRawValue().code);
    this.busy.set(false);
    if (outcome.ok) await this.router.navigateByUrl('/sign-in', { replaceUrl: true });
    else this.failure.set(outcome.sentence);
  }
}

/** What is wrong with a code as it is typed; empty: it may be one. */
export function codeTrouble(typed: string): string {
  const { length } = plainCode(typed);
  return length === TABLET_CODE_LENGTH
    ? ''
    : `A code has ${TABLET_CODE_LENGTH} letters and digits; this has ${length}.`;
}
