import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { LIMITS } from '@shared/contract/limits';
import type { LoomRecord } from '@shared/contract/shift-records';
import { Clock } from '../../core/clock';
import { OfflineBook } from '../../offline/offline-book';
import { additionOf, type Added, type AdditionValues } from './addition';
import { CauseOptions } from './cause-options';
import { ShiftWriter } from './shift-writer';

const HEADINGS: Readonly<Record<Added, string>> = {
  start: 'The start reading',
  end: 'The end reading',
  stop: 'A stop that was not logged',
  picks: 'Agreed picks: the clock was out of order',
  weaver: 'Who minded the loom from the start of the shift',
  cloth: 'What was on the loom from the start of the shift',
};

/** Adds what is missing on a line: a reading, a stop, agreed picks, the weaver, the cloth. */
@Component({
  selector: 'app-addition-form',
  imports: [CauseOptions, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './addition-form.html',
  styleUrl: './form.scss',
})
export class AdditionForm {
  readonly record = input.required<LoomRecord>();
  readonly what = input.required<Added>();
  readonly done = output<void>();

  protected readonly book = inject(OfflineBook);
  protected readonly writer = inject(ShiftWriter);
  private readonly clock = inject(Clock);
  protected readonly reasonLength = LIMITS.reasonLength;
  protected readonly asked = signal(false);
  protected readonly values = signal<AdditionValues>({
    value: '',
    cause: 'warp-break',
    count: '1',
    at: '',
    until: '',
    picks: '',
    weaverId: '',
    clothId: '',
    reason: '',
    kept: false,
  });
  protected readonly heading = computed(() => HEADINGS[this.what()]);
  protected readonly weavers = computed(() =>
    this.book.people().filter((person) => person.roles.includes('weaver')),
  );
  protected readonly addition = computed(() =>
    additionOf(this.what(), this.values(), {
      record: this.record(),
      reference: this.book.reference(),
      now: this.clock.tick(),
    }),
  );

  protected set<K extends keyof AdditionValues>(field: K, value: AdditionValues[K]): void {
    this.values.update((values) => ({ ...values, [field]: value }));
  }

  protected async save(): Promise<void> {
    this.asked.set(true);
    const { draft } = this.addition();
    if (!draft) return;
    const at = draft.at === undefined ? {} : { at: this.writer.deviceTime(draft.at) };
    const until =
      draft.kind === 'stop' && draft.until !== undefined
        ? { until: this.writer.deviceTime(draft.until) }
        : {};
    if (await this.writer.save([{ ...draft, ...at, ...until }])) this.done.emit();
  }
}
