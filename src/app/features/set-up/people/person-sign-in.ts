import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { PersonRow } from '@shared/contract/session';
import type { Letter } from '@shared/contract/set-up';
import { outcomeOf } from '../../../core/answer';
import { Clock } from '../../../core/clock';
import { formatMoment } from '../../../core/dates';
import { SessionStore } from '../../../core/session-store';
import { ErrorState } from '../../../ui/error-state';
import { SetUpStore } from '../common/set-up-store';
import { letterSentence } from '../mail/letter-words';
import { PeopleStore } from './people-store';

/** How a person signs in, and the way to a new password, a new PIN, or no sign-in at all. */
@Component({
  selector: 'app-person-sign-in',
  imports: [ErrorState, MatButton, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './person-sign-in.html',
  styleUrl: './person-sign-in.scss',
})
export class PersonSignIn {
  readonly person = input.required<PersonRow>();

  private readonly people = inject(PeopleStore);
  private readonly setUp = inject(SetUpStore);
  private readonly session = inject(SessionStore);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly sent = signal<Letter | null>(null);
  /** Asked once more before somebody is shut out. */
  protected readonly sure = signal(false);
  protected readonly isOneself = computed(() => this.session.person()?.id === this.person().id);
  protected readonly sentWords = computed(() => {
    const letter = this.sent();
    return letter ? letterSentence(letter) : '';
  });
  protected readonly atDesk = computed(() => {
    const { email, hasPassword } = this.person();
    if (email === null) return 'No: there is no e-mail address.';
    return hasPassword ? `Yes, with ${email} and a password.` : 'Not yet: no password was chosen.';
  });
  protected readonly onTablet = computed(() => {
    const { worksNumber, hasPin } = this.person();
    if (worksNumber === null) return 'No: there is no works number.';
    return hasPin ? `Yes, with ${worksNumber} and a PIN.` : 'Not yet: there is no PIN.';
  });
  protected readonly linkWords = computed(() => {
    const until = this.person().linkUntil;
    const now = this.clock.tick();
    if (until === null || until <= now) return '';
    return `A link was made; it works until ${formatMoment(until, now, this.setUp.timeZone())}.`;
  });

  protected async invite(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    this.sent.set(null);
    const answer = await this.people.invite(this.person().id);
    this.busy.set(false);
    if (answer.kind === 'ok') this.sent.set(answer.body);
    this.say(outcomeOf(answer));
    await this.people.reload();
  }

  protected async toSlip(): Promise<void> {
    this.people.forSlips.set(new Set([this.person().id]));
    await this.router.navigate(['/set-up/people/slips']);
  }

  protected async shut(disabled: boolean): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const answer = await this.people.save(this.person().id, { disabled });
    this.busy.set(false);
    this.sure.set(false);
    this.say(outcomeOf(answer));
    await this.people.reload();
  }

  private say(outcome: ReturnType<typeof outcomeOf>): void {
    if (!outcome.ok) this.failure.set(outcome.sentence);
  }
}
