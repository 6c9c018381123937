import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { formatCount } from '@shared/figures/format';
import { Subject, merge } from 'rxjs';
import { reportLoad } from '../../core/report-load';
import { BookReach } from '../../offline/book-reach';
import { OfflineBook } from '../../offline/offline-book';
import { ClothStrip } from '../../ui/cloth-strip';
import { ReportTrouble } from '../../ui/report-trouble';
import { stripLineOf } from '../../ui/strip-line';
import { AdditionForm } from './addition-form';
import { CellValue } from './cell-value';
import { DecideForm } from './decide-form';
import { LoomStory } from './loom-story-list';
import { storyOf } from './loom-story';
import { remediesOf, type RemedyAct } from './remedies';
import { sayBy } from './say';
import { sheetFigures } from '@shared/sheet/sheet-rows';
import { ShiftHeading } from './shift-heading';
import { ShiftRecordsClient } from './shift-records-client';
import { ShiftWriter } from './shift-writer';

/** One loom line, whole: figures, flags with their remedies, stretches, and all that was ever said of it. */
@Component({
  selector: 'app-loom-line-page',
  imports: [
    AdditionForm,
    CellValue,
    ClothStrip,
    DecideForm,
    LoomStory,
    MatButton,
    MatIcon,
    ReportTrouble,
    RouterLink,
    ShiftHeading,
  ],
  providers: [ShiftWriter],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './loom-line-page.html',
  styleUrls: ['./back-link.scss', './loom-line-page.scss'],
  host: { class: 'page' },
})
export class LoomLinePage {
  /** From the address. */
  readonly key = input.required<string>();
  readonly loomId = input.required<string>();

  private readonly records = inject(ShiftRecordsClient);
  private readonly book = inject(OfflineBook);
  private readonly reach = inject(BookReach);
  protected readonly writer = inject(ShiftWriter);
  protected readonly again = new Subject<void>();

  private readonly asked = computed(() => ({ key: this.key(), loomId: this.loomId() }), {
    equal: (a, b) => a.key === b.key && a.loomId === b.loomId,
  });
  protected readonly load = reportLoad(
    this.asked,
    merge(this.again, this.reach.changed),
    ({ key, loomId }, signal) => this.records.loom(key, loomId, signal),
  );
  protected readonly record = computed(() => this.load().value);
  protected readonly lastReached = this.reach.lastReachedWords;
  protected readonly say = computed(() => sayBy(this.book.reference(), this.book.people()));

  /** What is open on the page; another loom closes it. */
  protected readonly act = linkedSignal<unknown, RemedyAct | null>({
    source: this.asked,
    computation: () => null,
  });
  protected readonly correcting = computed(() => {
    const act = this.act();
    return act?.do === 'correct' ? act.entryId : null;
  });

  protected readonly runs = computed(() => {
    const record = this.record();
    return record !== null && record.asOf < record.shift.endsAt;
  });
  protected readonly closed = computed(() => this.record()?.shift.state === 'closed');
  protected readonly strip = computed(() => {
    const record = this.record();
    return record && stripLineOf(record.line, this.runs() ? record.asOf : null);
  });
  protected readonly figures = computed(() => {
    const record = this.record();
    return record && sheetFigures(record.figures, this.runs());
  });
  protected readonly remedies = computed(() => {
    const record = this.record();
    return record ? remediesOf(record.line, this.runs()) : [];
  });
  protected readonly story = computed(() => {
    const record = this.record();
    return record ? storyOf(record, this.say()) : [];
  });
  protected readonly stretches = computed(() => {
    const [record, say] = [this.record(), this.say()];
    return (record?.line.stretches ?? []).map((one) => ({
      from: say.time(one.from),
      until: say.time(one.until),
      cloth: one.clothId === null ? 'no cloth' : say.cloth(one.clothId),
      weaver: one.weaverId === null ? 'no weaver' : say.person(one.weaverId),
      ppm: one.ppm === null ? '–' : formatCount(one.ppm),
      picks: one.picks === null ? '–' : formatCount(one.picks),
      by: one.picksBy === 'shared' ? 'estimated' : one.picksBy === 'none' ? '' : one.picksBy,
    }));
  });
}
