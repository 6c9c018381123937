import { CdkDrag, type CdkDragEnd } from '@angular/cdk/drag-drop';
import { DOCUMENT } from '@angular/common';
import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  linkedSignal,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import type { Loom } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { formatDay } from '../../../core/dates';
import { OfflineBook } from '../../../offline/offline-book';
import { ShedBook } from '../../../offline/shed-book';
import { clockTime } from '../../../ui/clock-time';
import { EmptyState } from '../../../ui/empty-state';
import { floorPlan } from '../../../ui/floor-plan';
import { ShiftHeading } from '../shift-heading';
import { ShiftWriter } from '../shift-writer';
import { assignments, lastSets, weaverSets, type Minded } from './sets';

const NOBODY = 'nobody';
const MOST_PLACES = 8;

/** Puts weavers to looms: pick a weaver and tap looms, or drag the one onto the other. Works without network. */
@Component({
  selector: 'app-weavers-page',
  imports: [CdkDrag, EmptyState, MatButton, MatIcon, RouterLink, ShiftHeading],
  providers: [ShiftWriter],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './weavers-page.html',
  styleUrls: ['../back-link.scss', './weavers-page.scss'],
  host: { class: 'page' },
})
export class WeaversPage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();

  protected readonly book = inject(OfflineBook);
  protected readonly writer = inject(ShiftWriter);
  private readonly shed = inject(ShedBook);
  private readonly clock = inject(Clock);
  private readonly document = inject(DOCUMENT);

  protected readonly nobody = NOBODY;
  protected readonly now = this.clock.tick;
  protected readonly shift = computed(() => this.book.shifts().find(({ key }) => key === this.key()) ?? null);
  protected readonly shedName = computed(
    () => this.book.reference().sheds.find(({ id }) => id === this.shift()?.shedId)?.name ?? '',
  );
  private readonly otherShed = computed(() => {
    const key = this.key();
    const shed = this.book.reference().sheds.find(({ id }) => key.startsWith(`${id}:`));
    return shed && shed.id !== this.book.shedId() ? shed.id : null;
  });
  /** Who minds what by the book, what waits on this device among it. */
  private readonly was = computed<Minded>(() => {
    const shift = this.shift();
    return shift ? this.shed.weaversIn(shift) : new Map();
  });
  /** What was changed here and is not saved yet, by loom. */
  private readonly changes = linkedSignal<string, Minded>({ source: this.key, computation: () => new Map() });
  protected readonly minded = computed<Minded>(() => new Map([...this.was(), ...this.changes()]));
  protected readonly last = computed(() => {
    const shift = this.shift();
    return shift && lastSets(this.book.shifts(), shift, (earlier) => this.shed.weaversIn(earlier));
  });
  protected readonly lastWords = computed(() => {
    const last = this.last();
    return last ? `${last.shift.name} of ${formatDay(last.shift.date)}` : '';
  });
  protected readonly weavers = computed(() =>
    weaverSets(this.book.people(), this.book.looms(), this.minded(), this.last()?.minded ?? new Map()),
  );
  protected readonly rows = computed(() => floorPlan(this.book.looms()));
  /** Looms stand in their places where a row is short enough; a long one is wrapped. Null: wrapped. */
  protected readonly places = computed(() => {
    const most = Math.max(...this.rows().map(({ places }) => places), 1);
    return most <= MOST_PLACES ? most : null;
  });
  protected readonly without = computed(() =>
    this.book.looms().filter(({ id }) => (this.minded().get(id) ?? null) === null),
  );
  protected readonly withoutWords = computed(() => {
    const numbers = this.without().map(({ number }) => number);
    if (numbers.length === 0) return 'Every loom has a weaver.';
    const shown = numbers.length > 12 ? `${numbers.slice(0, 12).join(', ')} …` : numbers.join(', ');
    return numbers.length === 1
      ? `Loom ${shown} has no weaver.`
      : `${numbers.length} looms have no weaver: ${shown}.`;
  });
  /** Whom a tapped loom is given to; empty: nobody was picked yet. */
  protected readonly picked = signal('');
  protected readonly fromStart = signal(true);
  protected readonly begun = computed(() => {
    const shift = this.shift();
    return shift !== null && this.now() > shift.startsAt;
  });
  protected readonly over = computed(() => {
    const shift = this.shift();
    return shift !== null && this.now() >= shift.endsAt;
  });
  protected readonly count = computed(
    () => [...this.changes()].filter(([id, who]) => (this.was().get(id) ?? null) !== who).length,
  );
  protected readonly startWords = computed(() => this.timeOf(this.shift()?.startsAt ?? 0));
  protected readonly nowWords = computed(() => this.timeOf(this.now()));

  constructor() {
    effect(() => {
      const shed = this.otherShed();
      if (shed !== null) untracked(() => this.book.chooseShed(shed));
    });
    // Somebody is picked, so that the first tap does something.
    effect(() => {
      const [first] = this.weavers();
      untracked(() => {
        if (first && this.picked() === '') this.picked.set(first.person.id);
      });
    });
  }

  protected weaverName(loom: Loom): string {
    const id = this.minded().get(loom.id) ?? null;
    return this.book.people().find((person) => person.id === id)?.shortName ?? '';
  }

  protected isPicked(loom: Loom): boolean {
    return (this.minded().get(loom.id) ?? NOBODY) === this.picked();
  }

  protected isChanged(loom: Loom): boolean {
    return this.changes().has(loom.id) && (this.was().get(loom.id) ?? null) !== this.changes().get(loom.id);
  }

  protected labelOf(loom: Loom): string {
    const name = this.weaverName(loom);
    return `Loom ${loom.number}, ${name || 'no weaver'}${this.isChanged(loom) ? ', not saved' : ''}`;
  }

  /** To whom is picked; a loom that is theirs already is put down. */
  protected tap(loom: Loom): void {
    const picked = this.picked();
    if (picked === '') return;
    this.give(loom.id, picked === NOBODY || this.isPicked(loom) ? null : picked);
  }

  protected asLastTime(): void {
    const last = this.last();
    if (!last) return;
    const looms = new Set(this.book.looms().map(({ id }) => id));
    const sets = [...last.minded].filter(([loomId, weaverId]) => looms.has(loomId) && weaverId !== null);
    this.changes.set(new Map([...this.changes(), ...sets]));
  }

  /** A weaver was dropped: on a loom, it is theirs. */
  protected dropWeaver(event: CdkDragEnd, weaverId: string): void {
    const loomId = this.under(event, 'data-loom');
    if (loomId) this.give(loomId, weaverId === NOBODY ? null : weaverId);
    event.source.reset();
  }

  /** A loom was dropped: on a weaver, it is theirs. */
  protected dropLoom(event: CdkDragEnd, loom: Loom): void {
    const weaverId = this.under(event, 'data-weaver');
    if (weaverId) this.give(loom.id, weaverId === NOBODY ? null : weaverId);
    event.source.reset();
  }

  protected leave(): void {
    this.changes.set(new Map());
  }

  protected async save(): Promise<void> {
    const shift = this.shift();
    if (!shift) return;
    const moments = { shift, now: this.clock.correctedNow(), fromStart: this.fromStart() };
    const drafts = assignments(this.was(), this.minded(), moments).map((draft) => ({
      ...draft,
      at: this.writer.deviceTime(draft.at ?? moments.now),
    }));
    if (drafts.length > 0 && (await this.writer.save(drafts))) this.changes.set(new Map());
  }

  private give(loomId: string, weaverId: string | null): void {
    this.changes.set(new Map([...this.changes(), [loomId, weaverId]]));
  }

  /** What lies under the place of the drop, beneath what was dragged there. */
  private under({ source, dropPoint }: CdkDragEnd, attribute: string): string | null {
    const view = this.document.defaultView;
    const x = dropPoint.x - (view?.scrollX ?? 0);
    const y = dropPoint.y - (view?.scrollY ?? 0);
    const found = this.document
      .elementsFromPoint(x, y)
      .filter((element) => !source.element.nativeElement.contains(element))
      .map((element) => element.closest(`[${attribute}]`)?.getAttribute(attribute))
      .find(Boolean);
    return found ?? null;
  }

  private timeOf(at: number): string {
    return clockTime(at, this.book.reference().mill.timeZone);
  }
}
