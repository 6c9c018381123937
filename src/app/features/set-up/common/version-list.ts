import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { inForceAt } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { longMoment } from './moments';
import { SetUpStore } from './set-up-store';

export interface Version {
  readonly id: string;
  readonly effectiveAt: number;
  readonly words: string;
}

/** The year 2000, before all that the book takes: from the beginning. */
const BEGINNING = 946_684_800_000;

/** What held from when on, the newest first; what is in force now, and what is still to come, are marked. */
@Component({
  selector: 'app-version-list',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2>What held when</h2>
    <ol>
      @for (row of rows(); track row.id) {
        <li>
          <p class="when">
            {{ row.when }}
            @if (row.mark) {
              <span class="flag" [class.good]="row.mark === 'now'" [class.look]="row.mark === 'to come'">{{
                row.mark
              }}</span>
            }
          </p>
          <p class="muted small">{{ row.words }}</p>
        </li>
      }
    </ol>
  `,
  styles: `
    :host {
      display: grid;
      gap: 8px;
    }
    ol {
      display: grid;
      gap: 10px;
      padding: 0;
      list-style: none;
    }
    .when {
      display: flex;
      flex-wrap: wrap;
      gap: 4px 10px;
      font-weight: 600;
    }
  `,
})
export class VersionList {
  readonly versions = input.required<readonly Version[]>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  protected readonly rows = computed(() => {
    const now = this.clock.tick();
    const current = inForceAt(this.versions(), now);
    return [...this.versions()]
      .sort((a, b) => b.effectiveAt - a.effectiveAt || (a.id < b.id ? 1 : -1))
      .map((version) => ({
        id: version.id,
        words: version.words,
        when:
          version.effectiveAt <= BEGINNING
            ? 'From the beginning'
            : `From ${longMoment(version.effectiveAt, this.store.timeZone())}`,
        mark: version.id === current?.id ? 'now' : version.effectiveAt > now ? 'to come' : '',
      }));
  });
}
