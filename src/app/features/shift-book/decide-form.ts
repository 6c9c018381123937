import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { LIMITS } from '@shared/contract/limits';
import type { LoomRecord } from '@shared/contract/shift-records';
import { formatCount } from '@shared/figures/format';
import { OfflineBook } from '../../offline/offline-book';
import type { StoryEntry } from './loom-story';
import { sayBy } from './say';
import { ShiftWriter } from './shift-writer';

/** Which of the readings that disagree holds. The other stays on record. */
@Component({
  selector: 'app-decide-form',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form
      (submit)="save(); $event.preventDefault()"
      [attr.aria-label]="'Decide the ' + boundary() + ' reading'"
    >
      <fieldset>
        <legend>Which {{ boundary() }} reading holds?</legend>
        @for (one of candidates(); track one.id) {
          <label class="choice">
            <input
              type="radio"
              name="reading"
              [checked]="chosen() === one.id"
              (change)="chosen.set(one.id)"
            />
            <span
              ><b class="num">{{ one.value }}</b
              ><small>{{ one.words }}</small></span
            >
          </label>
        }
      </fieldset>
      <label class="field">
        Reason
        <input
          #why
          type="text"
          autocomplete="off"
          [maxLength]="reasonLength"
          (input)="reason.set(why.value)"
        />
      </label>
      @if (asked() && problem()) {
        <p class="problem" role="alert">{{ problem() }}</p>
      }
      @if (writer.failure()) {
        <p class="problem" role="alert">{{ writer.failure() }}</p>
      }
      <div class="acts">
        <button matButton="filled" type="submit" [disabled]="writer.busy()">This reading holds</button>
        <button matButton="outlined" type="button" (click)="done.emit()">Leave it</button>
      </div>
    </form>
  `,
  styleUrl: './form.scss',
})
export class DecideForm {
  readonly record = input.required<LoomRecord>();
  readonly story = input.required<readonly StoryEntry[]>();
  readonly boundary = input.required<'start' | 'end'>();
  readonly done = output<void>();

  private readonly book = inject(OfflineBook);
  protected readonly writer = inject(ShiftWriter);
  protected readonly reasonLength = LIMITS.reasonLength;
  protected readonly chosen = signal<string | null>(null);
  protected readonly reason = signal('');
  protected readonly asked = signal(false);

  protected readonly candidates = computed(() => {
    const say = sayBy(this.book.reference(), this.book.people());
    return this.record()
      .line.readings.filter((one) => one.boundary === this.boundary())
      .map((one) => {
        const who = this.story().find((entry) => entry.id === one.id)?.who ?? 'the book';
        const of = one.from === 'own' ? 'this shift' : 'the shift beside it';
        return {
          id: one.id,
          value: formatCount(one.value),
          words: `read ${say.time(one.at)} by ${who}, ${of}`,
        };
      });
  });
  protected readonly problem = computed(() =>
    this.chosen() === null
      ? 'Choose the reading that holds.'
      : this.reason().trim()
        ? ''
        : 'Say why in a word or two: the book keeps both.',
  );

  protected async save(): Promise<void> {
    this.asked.set(true);
    const readingId = this.chosen();
    if (this.problem() || readingId === null) return;
    const { shift, loomId } = this.record();
    const saved = await this.writer.save([
      {
        kind: 'decide',
        loomId,
        shiftKey: shift.key,
        shedId: shift.shedId,
        about: { boundary: this.boundary(), readingId },
        reason: this.reason().trim(),
      },
    ]);
    if (saved) this.done.emit();
  }
}
