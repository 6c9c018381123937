import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  signal,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatProgressBar } from '@angular/material/progress-bar';
import { Router, RouterLink } from '@angular/router';
import { SessionStore } from '../../core/session-store';
import { ErrorState } from '../../ui/error-state';
import { FloorSignInPanel } from './floor-sign-in-panel';

/**
 * Sign-in: on a registered tablet works number and PIN, in an office e-mail and password. Each leads to the other:
 * a foreman signs in on a tablet by e-mail to look after it.
 */
@Component({
  selector: 'app-sign-in-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [
    ErrorState,
    FloorSignInPanel,
    MatButton,
    MatFormFieldModule,
    MatInput,
    MatProgressBar,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './sign-in-page.html',
})
export class SignInPage {
  /** From the address: where to go afterwards. */
  readonly next = input<string>();

  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);

  protected readonly isTablet = this.session.isTablet;
  protected readonly device = this.session.device;
  protected readonly needsFirstManager = this.session.needsFirstManager;
  protected readonly revoked = computed(() => this.device()?.revoked === true);
  /** What fits the device, until somebody says otherwise. */
  protected readonly way = linkedSignal<'floor' | 'office'>(() => (this.isTablet() ? 'floor' : 'office'));
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.email]],
    password: ['', Validators.required],
  });

  /** Whose device this is has to be known first. */
  protected readonly known = computed(() => this.session.state() !== 'unknown');

  constructor() {
    void this.session.start();
  }

  protected async signIn(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const { email, password } = this.form.getRawValue();
    const outcome = await this.session.signInOffice(email.trim().toLowerCase(), password);
    this.busy.set(false);
    if (outcome.ok) await this.goOn();
    else this.failure.set(outcome.sentence);
  }

  protected async goOn(): Promise<void> {
    const next = this.next();
    // Only a way within the application: an address from elsewhere leads nowhere else.
    await this.router.navigateByUrl(next && /^\/(?![/\\])/.test(next) ? next : '/', { replaceUrl: true });
  }

  protected turnTo(way: 'floor' | 'office'): void {
    this.failure.set('');
    this.way.set(way);
  }
}
