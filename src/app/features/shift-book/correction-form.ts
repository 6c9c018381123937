import {
  ChangeDetectionStrategy,
  Component,
  type OnInit,
  computed,
  inject,
  input,
  output,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { LIMITS } from '@shared/contract/limits';
import { ARISES_FROM } from '@shared/contract/reference';
import type { LoomRecord } from '@shared/contract/shift-records';
import { OfflineBook } from '../../offline/offline-book';
import { BeforeAfter } from './before-after';
import { CauseOptions } from './cause-options';
import {
  correctionFields,
  correctionOf,
  valuesOf,
  type CorrectionField,
  type CorrectionValues,
} from './correction';
import type { StoryEntry } from './loom-story';
import { sayBy } from './say';
import { ShiftWriter } from './shift-writer';
import { sumsChanges } from './sums-words';
import { whatIf } from './what-if';

const LABELS: Readonly<Record<CorrectionField, string>> = {
  at: 'Time',
  until: 'Ran again at',
  loomId: 'Loom',
  cause: 'Cause',
  count: 'Count',
  value: 'Reading',
  newValue: 'New value',
  arisesFrom: 'Arises from',
  clothId: 'Cloth',
  note: 'Note',
};

/** Corrects an entry, or takes it back, with a reason; before and after are shown before anything is saved. */
@Component({
  selector: 'app-correction-form',
  imports: [BeforeAfter, CauseOptions, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './correction-form.html',
  styleUrl: './form.scss',
})
export class CorrectionForm implements OnInit {
  readonly entry = input.required<StoryEntry>();
  readonly record = input.required<LoomRecord>();
  readonly done = output<void>();

  protected readonly book = inject(OfflineBook);
  protected readonly writer = inject(ShiftWriter);
  protected readonly labels = LABELS;
  protected readonly arisesFrom = ARISES_FROM;
  protected readonly reasonLength = LIMITS.reasonLength;

  /** The entry as its author sees it: the correction is based on that, whatever comes meanwhile. */
  private readonly seen = signal<StoryEntry | null>(null);
  protected readonly values = signal<CorrectionValues | null>(null);
  protected readonly takeBack = signal(false);
  protected readonly reason = signal('');
  protected readonly asked = signal(false);

  private readonly say = computed(() => sayBy(this.book.reference(), this.book.people()));
  protected readonly fields = computed(() => {
    const seen = this.seen();
    return seen ? correctionFields(seen.resolved.entry) : [];
  });
  protected readonly correction = computed(() => {
    const [seen, values] = [this.seen(), this.values()];
    return seen && values
      ? correctionOf(seen.resolved, values, {
          timeZone: this.book.reference().mill.timeZone,
          say: this.say(),
          shift: this.record().shift,
        })
      : null;
  });
  protected readonly lineChanges = computed(() => {
    const [seen, correction] = [this.seen(), this.correction()];
    if (!seen || !correction || (!this.takeBack() && correction.changes.length === 0)) return null;
    const becomes = this.takeBack() ? null : correction.amended;
    const found = whatIf(this.record(), seen.id, becomes, {
      reference: this.book.reference(),
      shifts: this.book.shifts(),
    });
    return found && sumsChanges(found.before, found.after);
  });
  protected readonly overtaken = computed(() => this.entry().basedOn !== this.seen()?.basedOn);
  protected readonly problem = computed(() => {
    const correction = this.correction();
    if (!correction) return '';
    if (!this.takeBack()) {
      if (correction.problem) return correction.problem;
      if (correction.changes.length === 0) return 'Nothing is changed yet.';
    }
    return this.reason().trim() ? '' : 'Say why in a word or two: the book keeps both.';
  });

  ngOnInit(): void {
    const entry = untracked(this.entry);
    this.seen.set(entry);
    this.values.set(valuesOf(entry.resolved, untracked(this.say)));
    this.takeBack.set(correctionFields(entry.resolved.entry).length === 0);
  }

  protected set(field: CorrectionField, text: string): void {
    this.values.update((values) => values && { ...values, [field]: text });
  }

  protected async save(): Promise<void> {
    this.asked.set(true);
    const [seen, correction] = [this.seen(), this.correction()];
    if (this.problem() || !seen || !correction) return;
    const target = {
      targetId: seen.id,
      reason: this.reason().trim(),
      shedId: this.record().shift.shedId,
      ...this.writer.basedOn(seen.id, seen.basedOn),
    };
    const saved = await this.writer.save([
      this.takeBack()
        ? { kind: 'void', ...target }
        : { kind: 'amend', ...target, change: this.writer.deviceChange(correction.change) },
    ]);
    if (saved) this.done.emit();
  }
}
