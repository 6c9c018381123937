import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { inForceAt, type Target } from '@shared/contract/reference';
import { formatPercent, formatRate } from '@shared/figures/format';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { ListTable, type Column } from '../common/list-table';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';

interface TargetRow {
  readonly id: string;
  readonly name: string;
  readonly target: Target | undefined;
}

/** What each cloth's looms should reach. */
@Component({
  selector: 'app-targets-page',
  imports: [EmptyState, ListTable, MatButton, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="Targets"
      words="What the looms on a cloth should reach. A target is of the cloth, never of a person."
    />
    @if (saved()) {
      <p class="flag good said" role="status">The targets of {{ saved() }} are saved.</p>
    }
    @if (rows().length > 0) {
      <app-list-table
        what="cloths"
        [rows]="rows()"
        [columns]="columns"
        [current]="at() ?? null"
        (opened)="open($event.id)"
      />
    } @else {
      <app-empty-state heading="No cloth yet" words="Targets are set for cloths. Add the cloth first.">
        <a matButton="filled" routerLink="/set-up/cloths/new">Add a cloth</a>
      </app-empty-state>
    }
  `,
  styleUrl: '../common/room.scss',
})
export class TargetsPage {
  /** From the address: the cloth whose targets were saved last. */
  readonly at = input<string>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly rows = computed<readonly TargetRow[]>(() => {
    const { cloths, targets } = this.store.known();
    const now = this.clock.tick();
    return cloths
      .filter(({ retired }) => !retired)
      .map(({ id, name }) => ({
        id,
        name,
        target: inForceAt(
          targets.filter((one) => one.clothId === id),
          now,
        ),
      }));
  });
  protected readonly saved = computed(() => this.rows().find(({ id }) => id === this.at())?.name ?? '');
  protected readonly columns: readonly Column<TargetRow>[] = [
    { key: 'name', head: 'Cloth', text: (row) => row.name, share: 1.4 },
    figure('efficiency', 'Loom efficiency', (target) => target?.efficiency ?? null, formatPercent),
    figure('warp', 'Warp breaks per 10⁵ picks', (target) => target?.warpBreaks ?? null, atMost),
    figure('weft', 'Weft breaks per 10⁵ picks', (target) => target?.weftBreaks ?? null, atMost),
  ];

  protected async open(id: string): Promise<void> {
    await this.router.navigate(['/set-up/targets', id]);
  }
}

const atMost = (rate: number) => `≤ ${formatRate(rate)}`;

function figure(
  key: string,
  head: string,
  value: (target: Target | undefined) => number | null,
  say: (value: number) => string,
): Column<TargetRow> {
  return {
    key,
    head,
    text: (row) => {
      const found = value(row.target);
      return found === null ? '–' : say(found);
    },
    sort: (row) => value(row.target) ?? -1,
    figure: true,
  };
}
