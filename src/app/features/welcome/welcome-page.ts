import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatProgressBar } from '@angular/material/progress-bar';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { sentenceOf } from '@shared/contract/errors';
import { linkSchema, oneTimeTokenSchema, type OneTimeLink } from '@shared/contract/one-time';
import { outcomeOf } from '../../core/answer';
import { ApiClient } from '../../core/api-client';
import { API } from '../../core/api-paths';
import { SessionStore } from '../../core/session-store';
import { ErrorState } from '../../ui/error-state';
import { passwordTrouble } from './password-words';

/** Codes after which this link opens nothing any more, whatever is typed. */
const SPENT: ReadonlySet<string> = new Set(['link-wrong', 'link-used', 'link-replaced', 'link-expired']);

/** Where a letter's link leads: whoever has it chooses a password, once, and is signed in. */
@Component({
  selector: 'app-welcome-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [
    ErrorState,
    MatButton,
    MatFormFieldModule,
    MatInput,
    MatProgressBar,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './welcome-page.html',
  styleUrl: './welcome-page.scss',
})
export class WelcomePage {
  private readonly api = inject(ApiClient);
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  /** What the link proves stands after #, where no server sees it. */
  private readonly token = inject(ActivatedRoute).snapshot.fragment ?? '';

  protected readonly link = signal<OneTimeLink | null>(null);
  protected readonly trouble = signal('');
  protected readonly mayRetry = signal(false);
  protected readonly shown = signal(false);
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = new FormGroup({
    password: new FormControl('', {
      nonNullable: true,
      validators: ({ value }) => (passwordTrouble(String(value)) ? { password: true } : null),
    }),
  });
  private readonly typed = toSignal(this.form.controls.password.valueChanges, { initialValue: '' });
  protected readonly passwordHint = computed(() => passwordTrouble(this.typed()) || 'That will do.');
  protected readonly matcher = {
    isErrorState: () => this.form.invalid && (this.form.touched || this.form.dirty),
  };

  constructor() {
    void this.look();
  }

  protected async look(): Promise<void> {
    this.trouble.set('');
    if (!oneTimeTokenSchema.safeParse(this.token).success) return this.trouble.set(sentenceOf('link-wrong'));
    const answer = await this.api.bare(API.lookAtLink, linkSchema, { token: this.token });
    if (answer.kind === 'ok') return this.link.set(answer.body);
    const outcome = outcomeOf(answer);
    this.mayRetry.set(answer.kind === 'offline');
    if (!outcome.ok) this.trouble.set(outcome.sentence);
  }

  protected async choose(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const outcome = await this.session.redeemLink(this.token, this.form.getRawValue().password);
    this.busy.set(false);
    if (outcome.ok) await this.router.navigateByUrl('/', { replaceUrl: true });
    else if (SPENT.has(outcome.code)) this.trouble.set(outcome.sentence);
    else this.failure.set(outcome.sentence);
  }
}
