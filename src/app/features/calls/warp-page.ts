import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import { loomHistorySchema } from '@shared/contract/calls';
import { formatCount } from '@shared/figures/format';
import { startWith } from 'rxjs';
import { withQuery } from '../../core/api-client';
import { Clock } from '../../core/clock';
import type { EntryDraft } from '../../offline/entry-draft';
import { OfflineBook } from '../../offline/offline-book';
import { CAUTION } from '../../ui/caution';
import { PickPad, type PickReading } from '../../ui/pick-pad';
import type { ClockQuestion } from '../../ui/pick-reading';
import { beamChoice } from './beam-choice';
import { CallLog, sentenceOf } from './call-log';
import { CallsStore } from './calls-store';
import { seenReport } from './seen-report';
import { saidIn, UNLISTED, wantingIn, warpForm } from './warp-form';

const MINUTE = 60_000;

/** Gait or knot: the old warp out, the new one in, with the pick clock's reading between them, in one act. */
@Component({
  selector: 'app-warp-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, MatIcon, PickPad, ReactiveFormsModule, RouterLink],
  templateUrl: './warp-page.html',
  styleUrl: './form.scss',
  host: { class: 'page' },
})
export class WarpPage {
  /** From the address. */
  readonly loomId = input.required<string>();

  private readonly router = inject(Router);
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly log = inject(CallLog);
  private readonly store = inject(CallsStore);

  protected readonly caution = CAUTION;
  protected readonly unlisted = UNLISTED;
  protected readonly form = warpForm();
  private readonly value = toSignal(this.form.valueChanges.pipe(startWith(this.form.value)));
  private readonly history = seenReport(
    computed(() => withQuery('/api/reports/loom-history', { loomId: this.loomId() })),
    loomHistorySchema,
  );

  protected readonly loom = computed(() => this.store.loomById(this.loomId()));
  protected readonly stands = computed(() => this.store.standingOf(this.loomId()));
  /** The old one, as far as it is known here. */
  protected readonly old = computed(() => {
    const fitting = this.history.value()?.fitting;
    const cloth = this.store.clothOf(this.loomId());
    if (!fitting) return cloth ? { name: cloth.name, picks: '' } : null;
    const name = [fitting.warpName, fitting.clothName].filter(Boolean).join(', ');
    return { name, picks: formatCount(Math.round(fitting.picks)) };
  });
  protected readonly cloths = computed(() => this.book.reference().cloths.filter(({ retired }) => !retired));
  protected readonly beams = computed(() => {
    const names = new Map(this.book.reference().cloths.map(({ id, name }) => [id, name]));
    return (
      this.book
        .reference()
        .warps.map((warp) => ({ ...warp, cloth: names.get(warp.clothId) ?? '' }))
        // A mill numbers its beams on: the newest, which are still to be woven, stand first.
        .sort((a, b) => b.name.localeCompare(a.name, 'en-GB', { numeric: true }))
    );
  });
  /** All beams are wanted, those in other looms too. */
  protected readonly everyBeam = signal(false);
  private readonly elsewhere = computed(() => this.store.fittedElsewhere(this.loomId()));
  protected readonly choice = computed(() =>
    beamChoice(this.beams(), this.elsewhere(), this.everyBeam(), this.value()?.beam),
  );
  protected readonly beam = computed(() => this.beams().find(({ id }) => id === this.value()?.beam));
  protected readonly reading = signal<PickReading | null>(null);
  protected readonly padOpen = signal(false);
  protected readonly readWords = computed(() => {
    const reading = this.reading();
    return reading ? formatCount(reading.value) : '';
  });
  /** Null: no shift runs, so no reading has a place. */
  protected readonly question = computed<ClockQuestion | null>(() => {
    const version = this.book.loomVersionOf(this.loomId());
    const shift = this.book.currentShift();
    if (!version || !shift) return null;
    const last = this.book.lastReading(this.loomId());
    const comparable =
      last !== null && (version.clock.kind === 'continuous' || last.shiftKey === shift.key) ? last : null;
    return {
      id: `${version.loomId} change`,
      clock: version.clock,
      ppm: version.ppm,
      previous: comparable?.value ?? null,
      minutes: comparable ? Math.max(0, (this.clock.tick() - comparable.at) / MINUTE) : null,
    };
  });
  protected readonly tried = signal(false);
  protected readonly saving = signal(false);
  protected readonly complaint = signal('');
  protected readonly wanting = computed(() => {
    this.value();
    if (!this.tried()) return '';
    const said = wantingIn(this.form, this.stands() !== null);
    if (said) return said;
    return this.question() && !this.reading()
      ? 'Read the pick clock: without it the picks of the two warps can only be estimated.'
      : '';
  });

  constructor() {
    // The list knows the beam's cloth and length; both may be said otherwise.
    effect(() => {
      const beam = this.beam();
      if (!beam) return;
      this.form.patchValue({ clothId: beam.clothId, lengthM: String(beam.lengthM) });
    });
  }

  protected read(reading: PickReading): void {
    this.reading.set(reading);
    this.padOpen.set(false);
  }

  protected async save(): Promise<void> {
    this.tried.set(true);
    const loom = this.loom();
    if (this.wanting() || this.saving() || !loom) return;
    this.saving.set(true);
    this.complaint.set('');
    try {
      const entries = await this.book.logAll(this.entries());
      const batchId = entries[0]?.batchId;
      this.log.said(
        `Loom ${loom.number}: change of warp saved`,
        batchId === undefined ? null : () => this.book.undoBatch(batchId),
      );
      await this.router.navigate(['/calls/loom', loom.id]);
    } catch (error) {
      this.complaint.set(sentenceOf(error));
    } finally {
      this.saving.set(false);
    }
  }

  private entries(): EntryDraft[] {
    const loomId = this.loomId();
    const shift = this.book.currentShift();
    const reading = this.reading();
    const stands = this.stands();
    const entries: EntryDraft[] = [];
    if (reading && shift)
      entries.push({
        kind: 'reading',
        loomId,
        shiftKey: shift.key,
        boundary: 'change',
        value: reading.value,
        ...(reading.kept && { kept: true }),
      });
    entries.push({ kind: 'warp-change', loomId, ...saidIn(this.form, this.beam()) });
    if (stands && this.form.controls.runs.value === true)
      entries.push({ kind: 'resume', loomId, targetId: stands.id });
    return entries;
  }
}
