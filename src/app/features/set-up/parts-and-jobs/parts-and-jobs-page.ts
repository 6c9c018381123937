import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import type { Job, Part } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';
import { EmptyState } from '../../../ui/empty-state';
import { ListTable, type Column } from '../common/list-table';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { Unsaved } from '../common/unsaved';
import { JobPanel } from './job-panel';
import { PartPanel } from './part-panel';

type Open = { readonly what: 'part' | 'job'; readonly id: string | null };

/** Spare parts that repairs name, and jobs of care that come due by picks. */
@Component({
  selector: 'app-parts-and-jobs-page',
  imports: [EmptyState, JobPanel, ListTable, MatButton, MatIcon, PartPanel, RoomHeading],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './parts-and-jobs-page.html',
  styleUrls: ['../common/room.scss', './parts-and-jobs-page.scss'],
})
export class PartsAndJobsPage {
  private readonly store = inject(SetUpStore);
  private readonly unsaved = inject(Unsaved);
  private readonly injector = inject(Injector);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  protected readonly parts = computed(() => this.store.known().parts);
  protected readonly jobs = computed(() => this.store.known().jobs);
  protected readonly open = signal<Open | null>(null);
  protected readonly saved = signal('');
  protected readonly openPart = computed(() => this.parts().find(({ id }) => id === this.open()?.id) ?? null);
  protected readonly openJob = computed(() => this.jobs().find(({ id }) => id === this.open()?.id) ?? null);
  protected readonly partColumns: readonly Column<Part>[] = [
    { key: 'name', head: 'Part', text: ({ name }) => name, share: 2 },
    { key: 'state', head: 'Kept', text: ({ retired }) => (retired ? 'no longer' : 'yes') },
  ];
  protected readonly jobColumns: readonly Column<Job>[] = [
    { key: 'name', head: 'Job', text: ({ name }) => name, share: 2 },
    {
      key: 'every',
      head: 'Due again after',
      text: ({ everyPicks }) => `${formatCount(everyPicks)} picks`,
      sort: ({ everyPicks }) => everyPicks,
      figure: true,
      share: 1.4,
    },
    { key: 'state', head: 'Done', text: ({ retired }) => (retired ? 'no longer' : 'yes') },
  ];

  /** Opens one, or a new one (null), and puts the cursor into its name. */
  protected async show(what: Open['what'], id: string | null): Promise<void> {
    if (!(await this.unsaved.mayLeave())) return;
    this.saved.set('');
    this.open.set({ what, id });
    afterNextRender(() => this.host.nativeElement.querySelector<HTMLElement>('form input')?.focus(), {
      injector: this.injector,
    });
  }

  protected async leave(): Promise<void> {
    if (await this.unsaved.mayLeave()) this.close();
  }

  protected done(name: string): void {
    this.saved.set(name);
    this.close();
  }

  private close(): void {
    const what = this.open()?.what;
    this.open.set(null);
    // The cursor goes back to where it came from, not to the top of the page.
    afterNextRender(
      () => this.host.nativeElement.querySelector<HTMLElement>(`[data-add="${what}"]`)?.focus(),
      {
        injector: this.injector,
      },
    );
  }
}
