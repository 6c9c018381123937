import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal } from '@angular/core';
import { Router } from '@angular/router';
import type { Letter } from '@shared/contract/set-up';
import { Clock } from '../../../core/clock';
import { formatMoment } from '../../../core/dates';
import { loadOf, type ReportLoad } from '../../../core/report-load';
import { ReportTrouble } from '../../../ui/report-trouble';
import { ListTable, type Column } from '../common/list-table';
import { SetUpStore } from '../common/set-up-store';
import { LETTER_STATES } from './letter-words';
import { MailClient } from './mail-client';

/** The newest letters and what became of each. */
@Component({
  selector: 'app-letters-list',
  imports: [ListTable, ReportTrouble],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2>Letters</h2>
    @if (failing()) {
      <p class="problem" role="status">{{ failing() }}</p>
    }
    <app-report-trouble
      [state]="load().state"
      [sentence]="load().sentence"
      [kept]="load().value !== null"
      (retry)="fetch()"
    />
    @if (rows().length > 0) {
      <app-list-table what="letters" [rows]="rows()" [columns]="columns()" (opened)="open($event.id)" />
    } @else if (load().state === 'ready') {
      <p class="muted">None yet.</p>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
      min-width: 0;
    }
    .problem {
      color: var(--madder);
      font-weight: 600;
    }
  `,
})
export class LettersList {
  /** Another number: ask again. */
  readonly turn = input(0);

  private readonly client = inject(MailClient);
  private readonly setUp = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly load = signal<ReportLoad<readonly Letter[]>>({
    state: 'loading',
    value: null,
    sentence: '',
  });
  protected readonly rows = computed(() => this.load().value ?? []);
  /** Why letters do not go out now, said by the newest of those that wait. */
  protected readonly failing = computed(() => {
    const stuck = this.rows().filter(({ state, trouble }) => state === 'waiting' && trouble !== null);
    return stuck.length ? `${stuck.length} wait and are tried again by themselves. ${stuck[0]?.trouble}` : '';
  });
  protected readonly columns = computed<readonly Column<Letter>[]>(() => {
    const now = this.clock.tick();
    const zone = this.setUp.timeZone();
    return [
      { key: 'to', head: 'To', text: (row) => row.to, share: 1.4 },
      { key: 'subject', head: 'Subject', text: (row) => row.subject, share: 2 },
      { key: 'at', head: 'Written', text: (row) => formatMoment(row.at, now, zone), sort: (row) => row.at },
      { key: 'state', head: 'State', text: (row) => LETTER_STATES[row.state], share: 0.8 },
    ];
  });

  constructor() {
    effect(() => {
      this.turn();
      void this.fetch();
    });
  }

  protected async fetch(): Promise<void> {
    const answer = await this.client.letters();
    const letters = answer.kind === 'ok' ? { ...answer, body: answer.body.letters } : answer;
    this.load.update(({ value }) => loadOf<readonly Letter[]>(letters, value));
  }

  protected async open(id: string): Promise<void> {
    await this.router.navigate(['/set-up/mail/letters', id]);
  }
}
