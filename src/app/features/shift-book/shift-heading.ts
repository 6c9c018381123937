import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { Shift } from '@shared/contract/reference';
import { formatDay } from '../../core/dates';
import { OfflineBook } from '../../offline/offline-book';
import { NotSentNote } from './not-sent-note';
import { sayBy } from './say';
import { ShiftWriter } from './shift-writer';

/** Of which shift a page is, its heading, and how far what was said on it has come. */
@Component({
  selector: 'app-shift-heading',
  imports: [NotSentNote],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <header>
      <p class="place">{{ shedName() }} · {{ shiftWords() }}</p>
      <h1>{{ heading() }}</h1>
      <ng-content />
    </header>
    <div class="news" aria-live="polite">
      <app-not-sent-note [asOf]="say().time(asOf())" />
      @if (writer.progress(); as progress) {
        <p
          class="flag"
          [class.good]="progress.state === 'in-book'"
          [class.look]="progress.state === 'held'"
          [class.now]="progress.state === 'refused'"
        >
          {{ about() }}{{ progress.words }}
        </p>
      }
    </div>
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-2);
    }

    .place {
      font-weight: 600;
      margin-bottom: 4px;
    }

    .news {
      display: flex;
      flex-wrap: wrap;
      gap: 8px;

      &:not(:has(p)) {
        display: none;
      }
    }
  `,
})
export class ShiftHeading {
  readonly shift = input.required<Shift>();
  readonly shedName = input.required<string>();
  readonly heading = input.required<string>();
  /** The moment the page's figures are of, ms since 1970. */
  readonly asOf = input.required<number>();
  /** What the progress is of, before its words: "Your decision: ". */
  readonly about = input('');

  private readonly book = inject(OfflineBook);
  protected readonly writer = inject(ShiftWriter);
  protected readonly say = computed(() => sayBy(this.book.reference(), this.book.people()));
  protected readonly shiftWords = computed(() => {
    const { name, date, startsAt, endsAt } = this.shift();
    const { time } = this.say();
    return `${name}, ${formatDay(date)}, ${time(startsAt)} to ${time(endsAt)}`;
  });
}
