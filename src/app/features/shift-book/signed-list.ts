import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { SignedVersions } from '@shared/contract/shift-records';
import { formatMoment } from '../../core/dates';
import { BeforeAfter } from './before-after';
import type { Say } from './say';
import { groupRows, groupChanges, sumsChanges } from './sums-words';

/** What a version after the first is called; the others were signed at a closing. */
const WORDS: Readonly<Partial<Record<SignedVersions['versions'][number]['how'], string>>> = {
  accept: 'Restated',
  recalculate: 'Recalculated',
};

/** What was signed of a shift: every version, who, when, why, and what it changed of the one before. */
@Component({
  selector: 'app-signed-list',
  imports: [BeforeAfter],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (versions().length > 0) {
      <h2>What was signed</h2>
      <ol>
        @for (one of versions(); track one.version) {
          <li class="card">
            <h3>{{ one.heading }}</h3>
            <p class="small muted">Version {{ one.version }}{{ one.words ? ': “' + one.words + '”' : '' }}</p>
            <dl>
              @for (row of one.rows; track row.label) {
                <div>
                  <dt>{{ row.label }}</dt>
                  <dd class="num">{{ row.text }}</dd>
                </div>
              }
            </dl>
            @if (one.changes.length > 0) {
              <app-before-after caption="The shed, from the version before" [changes]="one.changes" />
            }
            @for (line of one.lines; track line.loomNumber) {
              <app-before-after [caption]="'Loom ' + line.loomNumber" [changes]="line.changes" />
            }
          </li>
        }
        @for (one of reopened(); track one.at) {
          <li class="card">
            <h3>Opened again {{ one.when }} by {{ one.by }}</h3>
            <p class="small muted">“{{ one.reason }}”</p>
          </li>
        }
      </ol>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-1);
      max-width: 820px;
    }
    ol {
      display: grid;
      gap: 8px;
      padding: 0;
      list-style: none;
    }
    li {
      display: grid;
      gap: 8px;
      padding: 12px var(--gap-2);
    }
    dl {
      display: flex;
      flex-wrap: wrap;
      gap: 8px 24px;
    }
    dt {
      font-size: 0.875rem;
      color: var(--ink-2);
    }
    dd {
      font-weight: 700;
    }
  `,
})
export class SignedList {
  readonly signed = input.required<SignedVersions>();
  readonly say = input.required<Say>();
  readonly now = input.required<number>();

  protected readonly versions = computed(() => {
    const all = this.signed().versions;
    return all
      .map((one, index) => {
        const before = all[index - 1];
        const what = WORDS[one.how] ?? (before ? 'Signed again' : 'Signed');
        return {
          version: one.version,
          heading: `${what} ${formatMoment(one.at, this.now())} by ${one.by}`,
          words: one.words ?? '',
          rows: groupRows(one.group),
          changes: before ? groupChanges(before.group, one.group) : [],
          lines: one.changed.map(({ loomNumber, before: was, after }) => ({
            loomNumber,
            changes: sumsChanges(was, after),
          })),
        };
      })
      .reverse();
  });
  protected readonly reopened = computed(() =>
    this.signed().reopened.map((one) => ({ ...one, when: formatMoment(one.at, this.now()) })),
  );
}
