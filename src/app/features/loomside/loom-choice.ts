import { ChangeDetectionStrategy, Component, computed, inject, input, model } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { OfflineBook } from '../../offline/offline-book';

/** The shed's looms, row by row: touched in the order of one's walk, each shows its place in it. */
@Component({
  selector: 'app-loom-choice',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton],
  template: `
    <p class="walk">
      <span class="muted">The order in which you touch the looms is the order of your walk.</span>
      @if (chosen().length) {
        <button matButton="outlined" type="button" (click)="chosen.set([])">Choose anew</button>
      }
    </p>
    @for (row of rows(); track row.row) {
      <section>
        <h2>Row {{ row.row }}</h2>
        <div class="looms">
          @for (loom of row.looms; track loom.id) {
            <button
              type="button"
              class="loom"
              [attr.aria-pressed]="chosen().includes(loom.id)"
              (click)="toggle(loom)"
              [attr.aria-label]="wordsOf(loom)"
            >
              <span class="num">{{ loom.number }}</span>
              @if (placeOf(loom); as place) {
                <span class="small">{{ place }}</span>
              } @else if (isTaken()(loom)) {
                <span class="small">taken</span>
              }
            </button>
          }
        </div>
      </section>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 14px;
    }
    .walk {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      justify-content: space-between;
      gap: 4px 16px;
      min-height: var(--touch);
    }
    section {
      display: grid;
      gap: 6px;
    }
    .looms {
      display: grid;
      /* A row of six stays one row on the narrowest phone. */
      grid-template-columns: repeat(auto-fill, minmax(48px, 1fr));
      gap: 6px;
    }
    @media (min-width: 600px) {
      .looms {
        grid-template-columns: repeat(auto-fill, minmax(64px, 1fr));
        gap: var(--gap-1);
      }
    }
    .loom {
      display: grid;
      place-items: center;
      align-content: center;
      min-height: var(--touch-primary);
      padding: 0;
      border: 1.5px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--raised);
      color: var(--ink);
    }
    .loom .num {
      font-size: 1.25rem;
      font-weight: 700;
    }
    .loom[aria-pressed='true'] {
      background: var(--ink);
      border-color: var(--ink);
      color: var(--on-ink);
    }
  `,
})
export class LoomChoice {
  private readonly book = inject(OfflineBook);

  /** In the order of the walk. */
  readonly chosen = model.required<readonly string[]>();
  /** Whether another minds it. */
  readonly isTaken = input.required<(loom: Loom) => boolean>();

  protected readonly rows = computed(() => {
    const rows = new Map<number, Loom[]>();
    for (const loom of this.book.looms()) rows.set(loom.row, [...(rows.get(loom.row) ?? []), loom]);
    return [...rows].map(([row, looms]) => ({ row, looms }));
  });

  protected toggle(loom: Loom): void {
    const chosen = this.chosen();
    const without = chosen.filter((id) => id !== loom.id);
    this.chosen.set(without.length < chosen.length ? without : [...chosen, loom.id]);
  }

  /** Its place in the walk, "2nd"; empty: not chosen. */
  protected placeOf(loom: Loom): string {
    const at = this.chosen().indexOf(loom.id) + 1;
    if (at === 0) return '';
    const teen = at % 100 >= 11 && at % 100 <= 13;
    return `${at}${(!teen && ['th', 'st', 'nd', 'rd'][at % 10]) || 'th'}`;
  }

  protected wordsOf(loom: Loom): string {
    const place = this.placeOf(loom);
    const taken = this.isTaken()(loom) ? ', taken' : '';
    return `Loom ${loom.number}${place ? `, ${place} in my walk` : ''}${taken}`;
  }
}
