import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { MatProgressBar } from '@angular/material/progress-bar';
import { RouterLink } from '@angular/router';
import { loomHistorySchema, type LoomHistory } from '@shared/contract/calls';
import { formatCount } from '@shared/figures/format';
import { Clock } from '../../core/clock';
import { formatDate, dateOf, formatMoment } from '../../core/dates';
import { withQuery } from '../../core/api-client';
import { OfflineBook } from '../../offline/offline-book';
import { CAUTION } from '../../ui/caution';
import { CallLog, sentenceOf } from './call-log';
import { CallsStore } from './calls-store';
import { PhotoView } from './photo-view';
import { effectRows, repeatWords, spanWords } from './repair-words';
import { SeenNote } from './seen-note';
import { seenReport } from './seen-report';

type Job = LoomHistory['jobs'][number];

/** Repairs shown at once: half a year of them is thirty screens of a phone. */
const AT_ONCE = 8;

const RAN = { well: 'ran well', watch: 'ran, to be watched', stands: 'still stood' } as const;

/** A loom for its tackler: what was done to it, what came of it, what lies in it, what is due. */
@Component({
  selector: 'app-calls-loom-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, MatIcon, MatProgressBar, PhotoView, RouterLink, SeenNote],
  templateUrl: './loom-page.html',
  styleUrl: './loom-page.scss',
  host: { class: 'page' },
})
export class LoomPage {
  /** From the address. */
  readonly loomId = input.required<string>();

  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly log = inject(CallLog);
  protected readonly store = inject(CallsStore);
  protected readonly caution = CAUTION;

  protected readonly report = seenReport(
    computed(() => withQuery('/api/reports/loom-history', { loomId: this.loomId() })),
    loomHistorySchema,
  );
  protected readonly loom = computed(() => this.store.loomById(this.loomId()));
  protected readonly stands = computed(() => {
    const stop = this.store.standingOf(this.loomId());
    return stop && { words: this.store.causeName(stop.cause, stop.from), since: this.moment(stop.from) };
  });
  protected readonly call = computed(() => {
    const loom = this.loom();
    return (loom && this.store.ofLoom(loom)()[0]) ?? null;
  });
  protected readonly fitting = computed(() => {
    const fitting = this.report.value()?.fitting;
    if (!fitting) return null;
    const more = [
      fitting.lengthM === null ? '' : `${formatCount(Math.round(fitting.lengthM))} m`,
      fitting.sizeSet ? `size set ${fitting.sizeSet}` : '',
      fitting.weftLot ? `weft lot ${fitting.weftLot}` : '',
    ].filter(Boolean);
    return {
      name: fitting.warpName ?? 'Warp without a name',
      cloth: fitting.clothName,
      since: formatDate(dateOf(fitting.since)),
      picks: formatCount(Math.round(fitting.picks)),
      more: more.join(' · '),
    };
  });
  private readonly shown = linkedSignal({ source: this.loomId, computation: () => AT_ONCE });
  protected readonly older = computed(() =>
    Math.max(0, (this.report.value()?.repairs ?? []).length - this.shown()),
  );
  protected readonly repairs = computed(() =>
    (this.report.value()?.repairs ?? []).slice(0, this.shown()).map((record) => ({
      ...record,
      when: this.moment(record.at),
      repeatWords: repeatWords(record),
      effects: effectRows(record),
      span: spanWords(record),
      ranWords: record.ran ? RAN[record.ran] : '',
    })),
  );
  /** Marked done here since the report came: the server has not counted them anew. */
  private readonly done = signal<ReadonlySet<string>>(new Set());
  protected readonly jobs = computed(() =>
    (this.report.value()?.jobs ?? []).map((job) => ({
      ...job,
      done: this.done().has(job.jobId),
      due: job.picks >= job.everyPicks && !this.done().has(job.jobId),
      words: `${formatCount(Math.round(job.picks))} of ${formatCount(job.everyPicks)} picks`,
      last: job.lastAt === null ? 'not done in the last half year' : `last ${formatDate(dateOf(job.lastAt))}`,
    })),
  );

  protected showOlder(): void {
    this.shown.update((count) => count + AT_ONCE);
  }

  protected async markDone(job: Job): Promise<void> {
    const loom = this.loom();
    if (!loom) return;
    try {
      const entry = await this.book.log({ kind: 'care', loomId: loom.id, jobId: job.jobId });
      this.done.update((ids) => new Set(ids).add(job.jobId));
      this.log.said(`Loom ${loom.number}: ${job.name}, done`, async () => {
        await this.book.undo(entry.id);
        this.done.update((ids) => new Set([...ids].filter((id) => id !== job.jobId)));
      });
    } catch (error) {
      this.log.said(sentenceOf(error), null);
    }
  }

  private moment(at: number): string {
    return formatMoment(at, this.clock.tick());
  }
}
