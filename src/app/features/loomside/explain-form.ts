import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Clock } from '../../core/clock';
import { OfflineBook } from '../../offline/offline-book';
import { CauseMark } from '../../ui/cause-mark';
import { ErrorState } from '../../ui/error-state';
import type { LoomView } from './loom-view';
import { Saving } from './saving';
import { causeSections } from './stop-choices';
import { PARTS, spanFor, type PartOfShift } from './unaccounted';

/** Says what minutes were that nobody logged: one touch of a cause, all of them, unless minutes or time are said first. */
@Component({
  selector: 'app-explain-form',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [CauseMark, ErrorState, MatButton],
  templateUrl: './explain-form.html',
  styleUrls: ['./cause-choices.scss', './explain-form.scss'],
})
export class ExplainForm {
  readonly view = input.required<LoomView>();
  /** Whole minutes, above 0. */
  readonly minutes = input.required<number>();
  readonly done = output<void>();

  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  protected readonly saving = new Saving();
  protected readonly parts = PARTS;
  protected readonly part = signal<PartOfShift>('late');
  protected readonly all = signal(false);
  private readonly whose = computed(() => this.view().loom.id);
  protected readonly said = linkedSignal<string, string>({
    source: this.whose,
    computation: () => String(this.minutes()),
  });
  protected readonly sections = computed(() => {
    const { loom } = this.view();
    const battery = this.book.loomVersionOf(loom.id)?.battery ?? false;
    const often = this.book.commonCauses(loom.id);
    const sections = causeSections(this.book.causes(), { battery, leaveOut: [], often });
    return this.all() ? sections : sections.slice(0, 1);
  });

  protected async explain(cause: string): Promise<void> {
    const said = this.said().trim();
    const minutes = Number(said);
    if (!/^\d{1,4}$/.test(said) || minutes < 1) {
      this.saving.say('How many minutes was it? Type a whole number of them. Nothing was logged.');
      return;
    }
    const span = spanFor(this.view().line, minutes, this.part(), this.clock.correctedNow());
    if (!span) {
      this.saving.say('The whole shift is logged as standing already. Nothing was logged.');
      return;
    }
    // Entries carry the device's own clock.
    const offset = this.clock.offset();
    const saved = await this.saving.keep(() =>
      this.book.log({
        kind: 'stop',
        loomId: this.view().loom.id,
        cause,
        count: 1,
        at: span.from - offset,
        until: span.until - offset,
        note: 'Said after the reading',
      }),
    );
    if (saved) this.done.emit();
  }
}
