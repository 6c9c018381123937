import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import type { PersonRow } from '@shared/contract/session';
import { Clock } from '../../../core/clock';
import { ReportTrouble } from '../../../ui/report-trouble';
import { ListTable, type Column } from '../common/list-table';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { PeopleStore } from './people-store';
import { rolesOf, shedsOf, signInWords } from './person-words';

/** Everybody who works with the book: who they are, what they may do, how they sign in. */
@Component({
  selector: 'app-people-page',
  imports: [ListTable, MatButton, MatIcon, ReportTrouble, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="People"
      words="Weavers and tacklers sign in on a tablet with works number and PIN, foremen and managers at a desk with e-mail and password. Choose people in the list to print slips with new PINs."
    >
      <a matButton="filled" routerLink="new"><mat-icon svgIcon="add" aria-hidden="true" /> Add a person</a>
      <button matButton="outlined" type="button" [disabled]="store.forSlips().size === 0" (click)="toSlips()">
        <mat-icon svgIcon="print" aria-hidden="true" /> PIN slips{{
          store.forSlips().size ? ' for ' + store.forSlips().size : ''
        }}
      </button>
    </app-room-heading>
    @if (saved()) {
      <p class="said" role="status">
        <span class="flag good">{{ saved()?.name }} is saved.</span>
        @if (lacksWayIn()) {
          <a [routerLink]="['/set-up/people', saved()?.id]">Send an invitation or print a PIN</a>
        }
      </p>
    }
    <app-report-trouble
      [state]="store.load().state"
      [sentence]="store.load().sentence"
      [kept]="store.load().value !== null"
      (retry)="store.reload()"
    />
    @if (rows().length > 0) {
      <app-list-table
        what="people"
        [rows]="rows()"
        [columns]="columns()"
        [selectable]="true"
        [selected]="store.forSlips()"
        (selectedChange)="store.forSlips.set($event)"
        [current]="at() ?? null"
        (opened)="open($event.id)"
      />
    }
  `,
  styleUrl: '../common/room.scss',
})
export class PeoplePage {
  /** From the address: who was saved last. */
  readonly at = input<string>();

  protected readonly store = inject(PeopleStore);
  private readonly setUp = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly rows = computed<readonly PersonRow[]>(() => this.store.load().value ?? []);
  protected readonly saved = computed(() => this.rows().find(({ id }) => id === this.at()) ?? null);
  protected readonly lacksWayIn = computed(() => {
    const person = this.saved();
    return person !== null && !person.hasPin && !person.hasPassword && person.disabledAt === null;
  });
  protected readonly columns = computed<readonly Column<PersonRow>[]>(() => {
    const { sheds } = this.setUp.known();
    const now = this.clock.tick();
    return [
      { key: 'name', head: 'Name', text: (row) => row.name, share: 1.4 },
      {
        key: 'number',
        head: 'Works number',
        text: (row) => row.worksNumber ?? '–',
        sort: (row) => Number(row.worksNumber ?? -1),
        figure: true,
      },
      { key: 'roles', head: 'Roles', text: rolesOf, share: 1.2 },
      { key: 'sheds', head: 'Sheds', text: (row) => shedsOf(row, sheds) },
      { key: 'in', head: 'Signs in by', text: (row) => signInWords(row, now), share: 1.2 },
    ];
  });

  constructor() {
    void this.store.reload();
  }

  protected async open(id: string): Promise<void> {
    await this.router.navigate(['/set-up/people', id]);
  }

  protected async toSlips(): Promise<void> {
    await this.router.navigate(['/set-up/people/slips']);
  }
}
