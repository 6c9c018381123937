import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { emailSchema } from '@shared/contract/session';
import type { Letter, MailSettings } from '@shared/contract/set-up';
import { outcomeOf } from '../../../core/answer';
import { loadOf, type ReportLoad } from '../../../core/report-load';
import { ErrorState } from '../../../ui/error-state';
import { ReportTrouble } from '../../../ui/report-trouble';
import { ChoiceField } from '../common/choice-field';
import { says } from '../common/field';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { judge, judgeTogether } from '../common/judge-together';
import { NumberField } from '../common/number-field';
import { RoomHeading } from '../common/room-heading';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { whileShown } from '../common/while-shown';
import { letterSentence } from './letter-words';
import { LettersList } from './letters-list';
import { MailClient } from './mail-client';
import { MAIL_LABELS, mailForm, mailOf, SECURITY_CHOICES, USUAL_PORTS, type PasswordWill } from './mail-form';

const OFF: MailSettings = {
  host: null,
  port: 587,
  security: 'starttls',
  user: '',
  hasPassword: false,
  from: '',
  baseUrl: '',
};

/** How letters go out, a test letter, and what became of the last ones. */
@Component({
  selector: 'app-mail-page',
  imports: [
    ChoiceField,
    ErrorState,
    FormFoot,
    LettersList,
    MatButton,
    NumberField,
    ReportTrouble,
    RoomHeading,
    TextField,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './mail-page.html',
  styleUrls: ['../common/room.scss', '../common/form.scss', './mail-page.scss'],
})
export class MailPage {
  private readonly client = inject(MailClient);
  protected readonly saver = inject(FormSaver);

  protected readonly labels = MAIL_LABELS;
  protected readonly securities = SECURITY_CHOICES;
  protected readonly load = signal<ReportLoad<MailSettings>>({ state: 'loading', value: null, sentence: '' });
  protected readonly settings = computed(() => this.load().value);
  protected readonly form = signal(mailForm(OFF));
  private readonly turns = turnsOf(this.form);
  protected readonly values = computed(() => {
    this.turns();
    return this.form().getRawValue();
  });
  protected readonly wills = computed(() => [
    ...(this.settings()?.hasPassword ? [{ value: 'keep' as const, words: 'stays as it is' }] : []),
    { value: 'new' as const, words: 'is typed here' },
    { value: 'none' as const, words: 'there is none' },
  ]);
  protected readonly portHint = computed(() => {
    const { port, security } = this.values();
    const usual = USUAL_PORTS[security];
    return port === usual ? '' : `${usual} usually goes with this security.`;
  });
  protected readonly isLocal = computed(() => /\/\/(localhost|127\.)/.test(this.settings()?.baseUrl ?? ''));

  protected readonly test = new FormGroup({
    to: new FormControl('', {
      nonNullable: true,
      validators: [
        says<string>((to) =>
          emailSchema.safeParse(to).success ? '' : 'Where the test letter goes, such as name@mill.example.',
        ),
      ],
    }),
  });
  protected readonly testing = signal(false);
  protected readonly testFailure = signal('');
  protected readonly tested = signal<Letter | null>(null);
  protected readonly testedWords = computed(() => {
    const letter = this.tested();
    return letter ? letterSentence(letter) : '';
  });
  /** Counts what may have made letters: the list asks again. */
  protected readonly lettersTurn = signal(0);

  constructor() {
    void this.fetch();
    keepUnsaved(() => this.form().dirty);
    whileShown(this.form, (form) =>
      judgeTogether(form, [
        form.controls.host,
        form.controls.user,
        form.controls.from,
        form.controls.password,
      ]),
    );
  }

  protected async fetch(): Promise<void> {
    const answer = await this.client.settings();
    this.load.update(({ value }) => loadOf(answer, value));
    if (answer.kind === 'ok') this.show(answer.body);
  }

  /** The usual port comes with the security, where the port was the usual one before. */
  protected chooseSecurity(): void {
    const { port, security } = this.form().controls;
    if (Object.values(USUAL_PORTS).includes(port.value ?? 0)) port.setValue(USUAL_PORTS[security.value]);
  }

  protected async save(): Promise<void> {
    const form = this.form();
    // Without user and password typed there is none to be asked for.
    const { host, user, password, will } = form.getRawValue();
    if (will === 'new' && password === '' && (host.trim() === '' || user.trim() === '')) {
      form.controls.will.setValue('none' satisfies PasswordWill);
      judge(form, Object.values(form.controls));
    }
    const saved = await this.saver.send(form, () => {
      const said = mailOf(form);
      return said ? this.client.save(said) : this.client.settings();
    });
    if (!saved) return;
    this.load.set({ state: 'ready', value: saved, sentence: '' });
    this.show(saved);
    this.lettersTurn.update((turn) => turn + 1);
  }

  protected async sendTest(): Promise<void> {
    this.test.markAllAsTouched();
    if (this.test.invalid || this.testing()) return;
    this.testing.set(true);
    this.testFailure.set('');
    this.tested.set(null);
    const answer = await this.client.test(this.test.getRawValue().to.trim());
    this.testing.set(false);
    if (answer.kind === 'ok') this.tested.set(answer.body);
    const outcome = outcomeOf(answer);
    if (!outcome.ok) this.testFailure.set(outcome.sentence);
    this.lettersTurn.update((turn) => turn + 1);
  }

  private show(settings: MailSettings): void {
    this.form.set(mailForm(settings));
  }
}
