import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import { formatCount } from '@shared/figures/format';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { versionToEdit } from '../common/in-force';
import { ListTable, type Column } from '../common/list-table';
import { QUANTITIES } from '../common/quantity';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { withUnit } from '../common/with-unit';

interface ClothRow {
  readonly id: string;
  readonly name: string;
  readonly ends: number;
  readonly picksPerCm: number;
  readonly reedWidthCm: number;
  readonly wefts: string;
  readonly retired: boolean;
}

/** The cloths that the mill weaves, each with its construction as it is now. */
@Component({
  selector: 'app-cloths-page',
  imports: [EmptyState, ListTable, MatButton, MatIcon, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="Cloths"
      words="A cloth’s construction: from it come metres of cloth, warp and weft used, and how long a pern lasts."
    >
      <a matButton="filled" routerLink="new"><mat-icon svgIcon="add" aria-hidden="true" /> Add a cloth</a>
    </app-room-heading>
    @if (saved()) {
      <p class="flag good said" role="status">{{ saved() }} is saved.</p>
    }
    @if (rows().length > 0) {
      <app-list-table
        what="cloths"
        [rows]="rows()"
        [columns]="columns()"
        [current]="at() ?? null"
        (opened)="open($event.id)"
      />
    } @else {
      <app-empty-state
        heading="No cloth yet"
        words="Add the first cloth. Looms are gaited with it, and its picks become metres."
      />
    }
  `,
  styleUrl: '../common/room.scss',
})
export class ClothsPage {
  /** From the address: the cloth that was saved last. */
  readonly at = input<string>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly rows = computed<readonly ClothRow[]>(() => {
    const { cloths, clothVersions } = this.store.known();
    const now = this.clock.tick();
    return cloths.flatMap(({ id, name, retired = false }) => {
      const version = versionToEdit(
        clothVersions.filter((one) => one.clothId === id),
        now,
      );
      if (!version) return [];
      return {
        id,
        name,
        retired,
        ends: version.ends,
        picksPerCm: version.picksPerCmLoomState,
        reedWidthCm: version.reedWidthCm,
        wefts: version.wefts.map((weft) => weft.name).join(', '),
      };
    });
  });
  protected readonly saved = computed(() => this.rows().find((row) => row.id === this.at())?.name ?? '');
  protected readonly columns = computed<readonly Column<ClothRow>[]>(() => {
    const units = this.store.units();
    return [
      {
        key: 'name',
        head: 'Cloth',
        text: (row) => row.name + (row.retired ? ' (no longer woven)' : ''),
        share: 1.6,
      },
      {
        key: 'ends',
        head: 'Ends',
        text: (row) => formatCount(row.ends),
        sort: (row) => row.ends,
        figure: true,
      },
      {
        key: 'picks',
        head: 'Picks, loom state',
        text: (row) => withUnit(row.picksPerCm, QUANTITIES.sett[units]),
        sort: (row) => row.picksPerCm,
        figure: true,
        share: 1.3,
      },
      {
        key: 'width',
        head: 'Reed width',
        text: (row) => withUnit(row.reedWidthCm, QUANTITIES.width[units]),
        sort: (row) => row.reedWidthCm,
        figure: true,
      },
      { key: 'wefts', head: 'Wefts', text: (row) => row.wefts, share: 1.4 },
    ];
  });

  protected async open(id: string): Promise<void> {
    await this.router.navigate(['/set-up/cloths', id]);
  }
}
