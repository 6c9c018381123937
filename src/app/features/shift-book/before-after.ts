import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { Change } from './entry-words';

/** What a correction or a decision changes: before and after, side by side. */
@Component({
  selector: 'app-before-after',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <table>
      <caption>
        {{
          caption()
        }}
      </caption>
      <thead class="visually-hidden">
        <tr>
          <th scope="col">What</th>
          <th scope="col">Before</th>
          <th scope="col">After</th>
        </tr>
      </thead>
      <tbody>
        @for (change of changes(); track change.label) {
          <tr>
            <th scope="row">{{ change.label }}</th>
            <td class="before">{{ change.before }}</td>
            <td class="arrow" aria-hidden="true">→</td>
            <td class="after">{{ change.after }}</td>
          </tr>
        }
      </tbody>
    </table>
  `,
  styles: `
    table {
      border-collapse: collapse;
      font-size: 0.9375rem;
    }
    caption {
      text-align: left;
      font-weight: 600;
      font-size: 0.875rem;
      color: var(--ink-2);
      padding-bottom: 2px;
    }
    th,
    td {
      padding: 2px 12px 2px 0;
      text-align: left;
      vertical-align: baseline;
      overflow-wrap: anywhere;
    }
    th {
      font-weight: 400;
    }
    td {
      font-variant-numeric: tabular-nums;
    }
    .before {
      color: var(--ink-2);
    }
    .after {
      font-weight: 700;
    }
  `,
})
export class BeforeAfter {
  readonly changes = input.required<readonly Change[]>();
  readonly caption = input.required<string>();
}
