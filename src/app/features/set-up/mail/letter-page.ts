import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Letter } from '@shared/contract/set-up';
import { outcomeOf } from '../../../core/answer';
import { Clock } from '../../../core/clock';
import { formatMoment } from '../../../core/dates';
import { loadOf, type ReportLoad } from '../../../core/report-load';
import { ReportTrouble } from '../../../ui/report-trouble';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { LETTER_STATES, letterSentence } from './letter-words';
import { MailClient } from './mail-client';

/** One letter: what became of it, and, unless it went out, what it says. */
@Component({
  selector: 'app-letter-page',
  imports: [MatButton, ReportTrouble, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading [heading]="letter()?.subject ?? 'Letter'">
      <a matButton="outlined" routerLink="/set-up/mail">To mail</a>
    </app-room-heading>
    <app-report-trouble
      [state]="load().state"
      [sentence]="load().sentence"
      [kept]="letter() !== null"
      (retry)="fetch()"
    />
    @if (letter(); as one) {
      <p>
        <span class="flag" [class.good]="one.state === 'sent'" [class.look]="one.state !== 'sent'">{{
          state()
        }}</span>
        to {{ one.to }}, {{ written() }}
      </p>
      <p>{{ sentence() }}</p>
      @if (one.state === 'failed' && text()) {
        <div>
          <button matButton="filled" type="button" [disabled]="busy()" (click)="again()">
            {{ busy() ? 'Asking the mail server …' : 'Send again' }}
          </button>
        </div>
      }
      @if (failure()) {
        <p class="muted" role="alert">{{ failure() }}</p>
      }
      @if (text()) {
        <pre class="card">{{ text() }}</pre>
        <p class="muted small">
          Whoever has the link in it can choose the password. Hand it to nobody else, and not by a way that
          others read.
        </p>
      } @else {
        <p class="muted">
          What a letter says is kept only until it has gone out: its link is for one person.
        </p>
      }
    }
  `,
  styles: `
    pre {
      max-width: 820px;
      padding: 16px;
      font: inherit;
      white-space: pre-wrap;
      overflow-wrap: anywhere;
    }
  `,
  styleUrl: '../common/room.scss',
})
export class LetterPage {
  readonly id = input.required<string>();

  private readonly client = inject(MailClient);
  private readonly setUp = inject(SetUpStore);
  private readonly clock = inject(Clock);

  protected readonly load = signal<ReportLoad<Letter>>({ state: 'loading', value: null, sentence: '' });
  protected readonly text = signal('');
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly letter = computed(() => this.load().value);
  protected readonly state = computed(() => LETTER_STATES[this.letter()?.state ?? 'waiting']);
  protected readonly sentence = computed(() => {
    const letter = this.letter();
    return letter ? letterSentence(letter) : '';
  });
  protected readonly written = computed(() =>
    formatMoment(this.letter()?.at ?? 0, this.clock.tick(), this.setUp.timeZone()),
  );

  constructor() {
    effect(() => {
      this.id();
      void this.fetch();
    });
  }

  /** One that went out has nothing more to say than its line in the list. */
  protected async fetch(): Promise<void> {
    const id = this.id();
    const whole = await this.client.letter(id);
    if (whole.kind === 'ok') this.text.set(whole.body.text);
    const answer = whole.kind === 'problem' && whole.code === 'not-found' ? await this.fromList(id) : null;
    this.load.update(({ value }) => loadOf<Letter>(answer ?? whole, value));
  }

  protected async again(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const outcome = outcomeOf(await this.client.again(this.id()));
    if (!outcome.ok) this.failure.set(outcome.sentence);
    this.text.set('');
    await this.fetch();
    this.busy.set(false);
  }

  private async fromList(id: string) {
    const list = await this.client.letters();
    const line = list.kind === 'ok' ? list.body.letters.find((one) => one.id === id) : undefined;
    return line ? { kind: 'ok' as const, body: line } : null;
  }
}
