import { ChangeDetectionStrategy, Component } from '@angular/core';
import { CauseMark } from '../../ui/cause-mark';
import { MARK_KINDS, MARK_WORDS } from '../../ui/mark-kind';

/** What the strips' marks mean. */
@Component({
  selector: 'app-mark-legend',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [CauseMark],
  template: `
    <ul aria-label="What the marks mean">
      <li><app-cause-mark mark="woven" /> woven</li>
      @for (mark of marks; track mark) {
        <li><app-cause-mark [mark]="mark" /> {{ words[mark] }}</li>
      }
    </ul>
  `,
  styles: `
    ul {
      display: flex;
      flex-wrap: wrap;
      gap: 6px 18px;
      padding: 0;
      list-style: none;
      font-size: 0.875rem;
      color: var(--ink-2);
    }
    li {
      display: inline-flex;
      align-items: center;
      gap: 8px;
    }
  `,
})
export class MarkLegend {
  protected readonly marks = MARK_KINDS;
  protected readonly words = MARK_WORDS;
}
