import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { NotSaved, notSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';
import { clockTime } from '../../ui/clock-time';
import { FloorStore } from './floor-store';
import { openShedStops, type OpenShedStop } from './shed-stops';

/** Stops the shed, or a row, by one tap, and ticks its looms off as they restart. A record, not a switch. */
@Component({
  selector: 'app-shed-stop-bar',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @for (stop of open(); track stop.id) {
      <section class="card" [attr.aria-label]="causeName(stop) + ', a shed stop'">
        <p>
          <b>{{ causeName(stop) }}</b> since <span class="num">{{ time(stop.since) }}</span>:
          {{ stop.looms.length === 1 ? '1 loom stands' : stop.looms.length + ' looms stand' }} still. Tap each
          as it runs again.
        </p>
        <ul>
          @for (loom of stop.looms; track loom.id) {
            <li>
              <button
                type="button"
                [attr.aria-label]="'Tick off loom ' + loom.number + ': it runs again'"
                (click)="runs(stop, [loom.id])"
              >
                {{ loom.number }}
              </button>
            </li>
          }
        </ul>
        <p class="acts">
          <button matButton="filled" type="button" (click)="allRun(stop)">All run again</button>
          @if (stop.id === made()) {
            <button matButton="outlined" type="button" (click)="takeBack(stop.id)">
              It was no stop: take it back
            </button>
          }
        </p>
      </section>
    }
    <details #choice>
      <summary>Shed stop</summary>
      <div class="choice">
        <label>
          What stands
          <select #where (change)="scope.set(where.value)">
            <option value="">The whole shed</option>
            @for (row of rows(); track row) {
              <option [value]="row">Row {{ row }}</option>
            }
          </select>
        </label>
        @for (cause of causes(); track cause.causeId) {
          <button matButton="filled" type="button" (click)="stopAll(cause.causeId); choice.open = false">
            {{ cause.name }}
          </button>
        }
      </div>
    </details>
    @if (failure()) {
      <p class="problem" role="alert">{{ failure() }}</p>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-1);
    }
    .card {
      display: grid;
      gap: 10px;
      padding: 12px var(--gap-2);
      border: 2px solid var(--ink);
    }
    ul,
    .acts,
    .choice {
      display: flex;
      flex-wrap: wrap;
      gap: var(--gap-1);
      align-items: end;
      padding: 0;
      list-style: none;
    }
    li button {
      min-width: var(--touch-primary);
      min-height: var(--touch-primary);
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--raised);
      font: 700 1.125rem var(--figure-family);
      cursor: pointer;
    }
    .choice .mat-mdc-button-base {
      min-height: var(--touch-primary);
    }
    summary {
      display: inline-flex;
      align-items: center;
      min-height: var(--touch);
      padding: 0 16px;
      border: 1px solid var(--line-strong);
      border-radius: 24px;
      background: var(--raised);
      font-weight: 600;
      cursor: pointer;
    }
    .choice {
      padding: 12px 0;
    }
    label {
      display: grid;
      gap: 4px;
      font-size: 0.875rem;
      font-weight: 600;
    }
    select {
      min-height: var(--touch-primary);
      padding: 0 12px;
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--surface);
      color: var(--ink);
      font: 400 1rem var(--text-family);
    }
    .problem {
      color: var(--madder);
      font-weight: 600;
    }
  `,
})
export class ShedStopBar {
  private readonly book = inject(OfflineBook);
  private readonly store = inject(FloorStore);

  protected readonly open = computed(() => openShedStops(this.store.looms()));
  protected readonly causes = computed(() => this.book.causes().filter(({ group }) => group === 'shed'));
  protected readonly rows = computed(() => this.store.plan().map(({ row }) => row));
  /** A row's number; empty: the shed. */
  protected readonly scope = signal('');
  /** The stop that was logged here, which can be taken back. */
  protected readonly made = signal('');
  protected readonly failure = signal('');

  protected causeName(stop: OpenShedStop): string {
    return this.store.causeName(stop.cause, stop.since);
  }

  protected time(at: number): string {
    return clockTime(at, this.store.timeZone());
  }

  protected stopAll(cause: string): Promise<void> {
    const row = this.scope();
    const scope = row === '' ? ({ of: 'shed' } as const) : ({ of: 'row', row: Number(row) } as const);
    return this.act(async () => this.made.set((await this.book.log({ kind: 'shed-stop', cause, scope })).id));
  }

  protected runs(stop: OpenShedStop, loomIds: readonly string[]): Promise<void> {
    return this.act(async () => {
      await this.book.logAll(loomIds.map((loomId) => ({ kind: 'resume', loomId, targetId: stop.id })));
    });
  }

  protected allRun(stop: OpenShedStop): Promise<void> {
    return this.runs(
      stop,
      stop.looms.map(({ id }) => id),
    );
  }

  protected takeBack(id: string): Promise<void> {
    return this.act(async () => {
      await this.book.undo(id, 'It was no shed stop');
      this.made.set('');
    });
  }

  private async act(work: () => Promise<void>): Promise<void> {
    try {
      await work();
      this.failure.set('');
    } catch (error) {
      this.failure.set((error instanceof NotSaved ? error : notSaved(error)).sentence);
    }
  }
}
