import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import { CAUSE_GROUPS, type CauseVersion } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { versionToEdit } from '../common/in-force';
import { ListTable, type Column } from '../common/list-table';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { GROUP_WORDS, allowanceWords } from './cause-form';

/** A row goes by its cause, whatever version is in force. */
type CauseRow = Omit<CauseVersion, 'id'> & { readonly id: string };

/** Why looms stand: who mends it, and what a tap without a time counts. */
@Component({
  selector: 'app-causes-page',
  imports: [ListTable, MatButton, MatIcon, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="Causes of stops"
      words="The allowance is what a tapped stop counts, marked as estimated: common practice until your own time study takes its place."
    >
      <a matButton="filled" routerLink="new"><mat-icon svgIcon="add" aria-hidden="true" /> Add a cause</a>
    </app-room-heading>
    @if (saved()) {
      <p class="flag good said" role="status">{{ saved() }} is saved.</p>
    }
    <app-list-table
      what="causes"
      [rows]="rows()"
      [columns]="columns"
      [current]="at() ?? null"
      (opened)="open($event.id)"
    />
  `,
  styleUrl: '../common/room.scss',
})
export class CausesPage {
  /** From the address: the cause that was saved last. */
  readonly at = input<string>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly rows = computed<readonly CauseRow[]>(() => {
    const now = this.clock.tick();
    const byCause = new Map<string, CauseVersion[]>();
    for (const version of this.store.known().causeVersions)
      byCause.set(version.causeId, [...(byCause.get(version.causeId) ?? []), version]);
    return [...byCause.values()]
      .flatMap((versions) => versionToEdit(versions, now) ?? [])
      .map((version) => ({ ...version, id: version.causeId }))
      .sort((a, b) => CAUSE_GROUPS.indexOf(a.group) - CAUSE_GROUPS.indexOf(b.group));
  });
  protected readonly saved = computed(() => this.rows().find(({ id }) => id === this.at())?.name ?? '');
  protected readonly columns: readonly Column<CauseRow>[] = [
    { key: 'name', head: 'Cause', text: (row) => row.name, share: 1.8 },
    {
      key: 'group',
      head: 'Group',
      text: (row) => GROUP_WORDS[row.group],
      sort: (row) => CAUSE_GROUPS.indexOf(row.group),
    },
    {
      key: 'attended',
      head: 'Attended by',
      text: (row) => (row.attendedBy === 'nobody' ? '–' : row.attendedBy),
    },
    {
      key: 'allowance',
      head: 'Allowance',
      text: (row) => allowanceWords(row.allowanceS),
      sort: (row) => row.allowanceS ?? Number.MAX_VALUE,
      figure: true,
    },
    { key: 'break', head: 'Counts as', text: (row) => (row.breakOf ? `${row.breakOf} break` : '–') },
  ];

  protected async open(id: string): Promise<void> {
    await this.router.navigate(['/set-up/causes', id]);
  }
}
