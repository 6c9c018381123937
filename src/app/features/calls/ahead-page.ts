import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { MatProgressBar } from '@angular/material/progress-bar';
import { RouterLink } from '@angular/router';
import { tacklerAheadSchema, type TacklerAhead } from '@shared/contract/calls';
import { formatCount } from '@shared/figures/format';
import { isNoFigure, noFigureSentence, type Figure } from '@shared/figures/no-figure';
import { withQuery } from '../../core/api-client';
import { Clock } from '../../core/clock';
import { formatMoment } from '../../core/dates';
import { OfflineBook } from '../../offline/offline-book';
import { CAUTION } from '../../ui/caution';
import { EmptyState } from '../../ui/empty-state';
import { CallLog, sentenceOf } from './call-log';
import { SeenNote } from './seen-note';
import { seenReport } from './seen-report';

type Beam = TacklerAhead['beams'][number];
type Job = TacklerAhead['jobs'][number];

/** Jobs that stand above the beams until somebody wants all of them. */
const SHOWN = 5;
/** Beams shown before one asks for all: what is out within days stands first. */
const BEAMS_SHOWN = 8;

/** What comes up: jobs that are due by picks, and beams in the order in which they run out. */
@Component({
  selector: 'app-ahead-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, MatButton, MatIcon, MatProgressBar, RouterLink, SeenNote],
  templateUrl: './ahead-page.html',
  styleUrl: './ahead-page.scss',
  host: { class: 'page' },
})
export class AheadPage {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly log = inject(CallLog);
  protected readonly caution = CAUTION;

  protected readonly report = seenReport(
    computed(() => {
      const shedId = this.book.shedId();
      return shedId === null ? null : withQuery('/api/reports/tackler-ahead', { shedId });
    }),
    tacklerAheadSchema,
  );
  /** Marked done here since the report came: the server has not counted them anew. */
  private readonly done = signal<ReadonlySet<string>>(new Set());
  protected readonly jobs = computed(() =>
    (this.report.value()?.jobs ?? [])
      .filter((job) => !this.done().has(keyOf(job)))
      .map((job) => ({
        ...job,
        key: keyOf(job),
        words: `${formatCount(Math.round(job.picks))} picks, due every ${formatCount(job.everyPicks)}`,
        last: job.lastAt === null ? '' : `last done ${this.moment(job.lastAt)}`,
      })),
  );
  protected readonly all = signal(false);
  protected readonly shown = computed(() => (this.all() ? this.jobs() : this.jobs().slice(0, SHOWN)));
  protected readonly more = computed(() => this.jobs().length - this.shown().length);
  private readonly allBeams = computed(() =>
    (this.report.value()?.beams ?? []).map((beam) => ({
      ...beam,
      when: isNoFigure(beam.expected) ? '' : this.moment(beam.expected),
      range: this.rangeOf(beam),
      why: isNoFigure(beam.expected) ? noFigureSentence(beam.expected) : '',
      left: leftWords(beam),
    })),
  );
  protected readonly everyBeam = signal(false);
  protected readonly beams = computed(() =>
    this.everyBeam() ? this.allBeams() : this.allBeams().slice(0, BEAMS_SHOWN),
  );
  protected readonly moreBeams = computed(() => this.allBeams().length - this.beams().length);

  protected async markDone(job: Job): Promise<void> {
    const key = keyOf(job);
    try {
      const entry = await this.book.log({ kind: 'care', loomId: job.loomId, jobId: job.jobId });
      this.done.update((keys) => new Set(keys).add(key));
      this.log.said(`Loom ${job.loomNumber}: ${job.name}, done`, async () => {
        await this.book.undo(entry.id);
        this.done.update((keys) => new Set([...keys].filter((one) => one !== key)));
      });
    } catch (error) {
      this.log.said(sentenceOf(error), null);
    }
  }

  private rangeOf({ earliest, latest }: Beam): string {
    if (isNoFigure(earliest)) return '';
    return isNoFigure(latest)
      ? `not before ${this.moment(earliest)}`
      : `${this.moment(earliest)} to ${this.moment(latest)}, eight times in ten`;
  }

  private moment(at: number): string {
    return formatMoment(at, this.clock.tick());
  }
}

function keyOf({ loomId, jobId }: Job): string {
  return `${loomId} ${jobId}`;
}

function leftWords({ metresLeft, picksLeft }: Beam): string {
  const figure = (value: Figure, unit: string) =>
    isNoFigure(value) ? '' : `${formatCount(Math.round(value))} ${unit}`;
  return [figure(metresLeft, 'm'), figure(picksLeft, 'picks')].filter(Boolean).join(', ');
}
