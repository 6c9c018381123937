import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { peopleListSchema, type PersonRow } from '@shared/contract/session';
import { outcomeOf } from '../../../core/answer';
import { ApiClient } from '../../../core/api-client';
import { SetUpStore } from '../common/set-up-store';
import { AlleyForm } from './alley-form';

/** The alleys of a shed and the tacklers who serve them. */
@Component({
  selector: 'app-alleys-list',
  imports: [AlleyForm, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2>Alleys and their tacklers</h2>
    @if (failure()) {
      <p class="problem" role="alert">{{ failure() }}</p>
    }
    <ul>
      @for (alley of alleys(); track alley.name) {
        <li class="card">
          <div>
            <h3>Alley {{ alley.name }}</h3>
            <p class="muted">
              {{ alley.looms }} looms · {{ alley.served || 'no tackler yet: calls go to all of them' }}
            </p>
          </div>
          @if (open() !== alley.name) {
            <button matButton="outlined" type="button" (click)="open.set(alley.name)">
              Change<span class="visually-hidden"> alley {{ alley.name }}</span>
            </button>
          } @else {
            <app-alley-form
              [shedId]="shedId()"
              [name]="alley.name"
              [tacklerIds]="alley.tacklerIds"
              [tacklers]="tacklers()"
              (done)="open.set(null)"
            />
          }
        </li>
      }
    </ul>
  `,
  styles: `
    :host {
      display: grid;
      gap: 10px;
    }
    ul {
      display: grid;
      gap: 8px;
      padding: 0;
      list-style: none;
    }
    li {
      display: flex;
      flex-wrap: wrap;
      gap: 8px 16px;
      align-items: center;
      justify-content: space-between;
      padding: 10px var(--gap-2);
    }
    app-alley-form {
      flex-basis: 100%;
    }
    .problem {
      color: var(--madder);
    }
  `,
})
export class AlleysList {
  readonly shedId = input.required<string>();

  private readonly store = inject(SetUpStore);
  private readonly api = inject(ApiClient);
  private readonly people = signal<readonly PersonRow[]>([]);
  protected readonly failure = signal('');
  protected readonly open = signal<string | null>(null);
  protected readonly tacklers = computed(() =>
    this.people().filter(
      (person) =>
        person.disabledAt === null &&
        person.roles.includes('tackler') &&
        (person.shedIds.length === 0 || person.shedIds.includes(this.shedId())),
    ),
  );
  protected readonly alleys = computed(() => {
    const { looms, alleys } = this.store.known();
    const own = looms.filter((loom) => loom.shedId === this.shedId() && loom.until === null);
    const names = [...new Set(own.map((loom) => loom.alley))].sort((a, b) =>
      a.localeCompare(b, 'en', { numeric: true }),
    );
    return names.map((name) => {
      const tacklerIds =
        alleys.find((one) => one.shedId === this.shedId() && one.name === name)?.tacklerIds ?? [];
      const served = tacklerIds.map((id) => this.people().find((person) => person.id === id)?.name ?? '…');
      return {
        name,
        tacklerIds,
        served: served.join(', '),
        looms: own.filter((loom) => loom.alley === name).length,
      };
    });
  });

  constructor() {
    void this.load();
  }

  private async load(): Promise<void> {
    const answer = await this.api.get('/api/people', peopleListSchema);
    if (answer.kind === 'ok') this.people.set(answer.body.people);
    else {
      const outcome = outcomeOf(answer);
      this.failure.set(outcome.ok ? '' : outcome.sentence);
    }
  }
}
