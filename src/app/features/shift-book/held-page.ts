import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import { Subject, merge } from 'rxjs';
import { reportLoad } from '../../core/report-load';
import { BookReach } from '../../offline/book-reach';
import { OfflineBook } from '../../offline/offline-book';
import { EmptyState } from '../../ui/empty-state';
import { ReportTrouble } from '../../ui/report-trouble';
import { BeforeAfter } from './before-after';
import { heldItems } from './held-list';
import { sayBy } from './say';
import { ShiftHeading } from './shift-heading';
import { ShiftRecordsClient } from './shift-records-client';
import { ShiftWriter } from './shift-writer';
import { groupChanges } from './sums-words';

type Decision = 'accept' | 'refuse';

/** Entries that wait for a decision: why each waits, what it would change; accepted or refused with a reason. */
@Component({
  selector: 'app-held-page',
  imports: [BeforeAfter, EmptyState, MatButton, MatIcon, ReportTrouble, RouterLink, ShiftHeading],
  providers: [ShiftWriter],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './held-page.html',
  styleUrls: ['./back-link.scss', './form.scss', './held-page.scss'],
  host: { class: 'page' },
})
export class HeldPage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();

  private readonly records = inject(ShiftRecordsClient);
  private readonly book = inject(OfflineBook);
  private readonly reach = inject(BookReach);
  protected readonly writer = inject(ShiftWriter);
  protected readonly again = new Subject<void>();
  protected readonly reasonLength = LIMITS.reasonLength;

  protected readonly load = reportLoad(this.key, merge(this.again, this.reach.changed), (key, signal) =>
    this.records.held(key, signal),
  );
  protected readonly held = computed(() => this.load().value);
  protected readonly lastReached = this.reach.lastReachedWords;
  private readonly say = computed(() => sayBy(this.book.reference(), this.book.people()));

  protected readonly chosen = signal<ReadonlySet<string>>(new Set());
  protected readonly reason = signal('');
  protected readonly asked = signal(false);
  /** What was decided here and has not come round through the book yet. */
  private readonly decided = signal<ReadonlySet<string>>(new Set());

  protected readonly items = computed(() => {
    const held = this.held();
    return held ? heldItems(held, this.say()).filter((one) => !this.decided().has(one.id)) : [];
  });
  /** Those ticked that still wait. */
  protected readonly ticked = computed(() => this.items().filter((one) => this.chosen().has(one.id)));
  protected readonly altogether = computed(() => {
    const held = this.held();
    return held ? groupChanges(held.before, held.after) : [];
  });
  protected readonly isClosed = computed(() => this.held()?.shift.state === 'closed');
  protected readonly problem = computed(() => {
    if (this.ticked().length === 0) return 'Tick what you decide about.';
    return this.reason().trim() ? '' : 'Say why in a word or two: the book keeps it with each.';
  });
  protected readonly heading = computed(() => {
    const count = this.items().length;
    if (count === 0) return 'Nothing is held';
    return count === 1 ? '1 entry waits for you' : `${count} entries wait for you`;
  });

  protected tick(id: string, on: boolean): void {
    this.chosen.update((chosen) => {
      const next = new Set(chosen);
      if (on) next.add(id);
      else next.delete(id);
      return next;
    });
  }

  protected tickAll(on: boolean): void {
    this.chosen.set(new Set(on ? this.items().map((one) => one.id) : []));
  }

  protected async decide(kind: Decision): Promise<void> {
    this.asked.set(true);
    const shedId = this.held()?.shift.shedId;
    if (this.problem() || shedId === undefined) return;
    const reason = this.reason().trim();
    const ids = this.ticked().map((one) => one.id);
    if (!(await this.writer.save(ids.map((targetId) => ({ kind, targetId, reason, shedId }))))) return;
    this.decided.update((decided) => new Set([...decided, ...ids]));
    this.chosen.set(new Set());
    this.reason.set('');
    this.asked.set(false);
  }
}
