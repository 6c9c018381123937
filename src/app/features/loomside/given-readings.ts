import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';

/** What the outgoing weaver read on a loom that begins my shift. */
export interface GivenReading {
  readonly loom: Loom;
  readonly value: number;
  /** "13:58". */
  readonly at: string;
}

/** The outgoing weaver has read the set: it is confirmed by one tap, but for looms whose clock shows something else. */
@Component({
  selector: 'app-given-readings',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton],
  template: `
    <table>
      <caption class="visually-hidden">
        What the outgoing weaver has read
      </caption>
      <thead>
        <tr>
          <th scope="col">Loom</th>
          <th scope="col" class="num">Reading</th>
          <th scope="col" class="num">Read at</th>
          <td></td>
        </tr>
      </thead>
      <tbody>
        @for (one of given(); track one.loom.id) {
          <tr [attr.data-loom]="one.loom.number">
            <th scope="row" class="num">{{ one.loom.number }}</th>
            <td class="num strong">{{ format(one.value) }}</td>
            <td class="num">{{ one.at }}</td>
            <td class="answer">
              <button
                matButton="outlined"
                type="button"
                [attr.aria-pressed]="isOther(one)"
                [attr.aria-label]="'Loom ' + one.loom.number + ' shows something else'"
                (click)="toggle(one)"
              >
                {{ isOther(one) ? 'I read it' : 'Differs' }}
              </button>
            </td>
          </tr>
        }
      </tbody>
    </table>
    @if (agreed().length) {
      <button matButton="filled" class="go" type="button" [disabled]="busy()" (click)="confirm()">
        {{ agreed().length === 1 ? '1 loom shows' : agreed().length + ' looms show' }} this
      </button>
    } @else {
      <button matButton="filled" class="go" type="button" (click)="confirm()">Read each loom</button>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 14px;
    }
    table {
      width: 100%;
      border-collapse: collapse;
    }
    th,
    td {
      height: 56px;
      padding: 2px 8px;
      border-bottom: 1px solid var(--line);
      text-align: left;
    }
    thead th {
      height: 32px;
      font-size: 0.875rem;
      color: var(--ink-2);
    }
    .num {
      text-align: right;
    }
    .strong {
      font-size: 1.25rem;
      font-weight: 700;
    }
    .answer {
      text-align: right;
    }
    button[aria-pressed='true'] {
      background: var(--weld-soft);
    }
    .go {
      min-height: var(--touch-primary);
      font-size: 1.125rem;
    }
  `,
})
export class GivenReadings {
  readonly given = input.required<readonly GivenReading[]>();
  readonly busy = input(false);
  /** Those that the clocks show. */
  readonly confirmed = output<readonly GivenReading[]>();
  /** Those to be read one by one. */
  readonly others = output<readonly Loom[]>();

  protected readonly format = formatCount;
  private readonly ids = computed(() => this.given().map((one) => one.loom.id), {
    equal: (a, b) => a.join() === b.join(),
  });
  private readonly other = linkedSignal<readonly string[], readonly string[]>({
    source: this.ids,
    computation: (ids, before) => before?.value.filter((id) => ids.includes(id)) ?? [],
  });
  protected readonly agreed = computed(() => this.given().filter((one) => !this.isOther(one)));

  protected isOther(one: GivenReading): boolean {
    return this.other().includes(one.loom.id);
  }

  protected toggle({ loom }: GivenReading): void {
    const other = this.other();
    this.other.set(other.includes(loom.id) ? other.filter((id) => id !== loom.id) : [...other, loom.id]);
  }

  protected confirm(): void {
    const agreed = this.agreed();
    this.others.emit(
      this.given()
        .filter((one) => this.isOther(one))
        .map((one) => one.loom),
    );
    if (agreed.length) this.confirmed.emit(agreed);
  }
}
