import { ChangeDetectionStrategy, Component } from '@angular/core';
import { CauseMark } from '../../ui/cause-mark';
import { MARK_KINDS, MARK_WORDS } from '../../ui/mark-kind';

/** What the strip's marks mean, and how minutes are told apart. */
@Component({
  selector: 'app-strip-legend',
  imports: [CauseMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 class="visually-hidden">Legend</h2>
    <ul>
      <li><app-cause-mark mark="woven" /> woven</li>
      @for (mark of marks; track mark) {
        <li><app-cause-mark [mark]="mark" /> {{ words[mark] }}</li>
      }
    </ul>
    <p class="small muted">
      Timed: between two moments. Estimated: stops tapped without a time, at the cause’s allowance. Not
      logged: what the picks show as lost beyond that. Pern changes are ticks on the lower selvedge. Intervals
      beneath rates are 95%.
    </p>
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-1);
    }
    ul {
      display: flex;
      flex-wrap: wrap;
      gap: 6px 20px;
      padding: 0;
      list-style: none;
      font-size: 0.9375rem;
    }
    li {
      display: inline-flex;
      align-items: center;
      gap: 8px;
    }
    p {
      max-width: 90ch;
    }
    @media print {
      app-cause-mark {
        filter: grayscale(1);
      }
    }
  `,
})
export class StripLegend {
  protected readonly marks = MARK_KINDS;
  protected readonly words = MARK_WORDS;
}
