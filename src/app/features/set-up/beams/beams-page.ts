import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import type { SetUp } from '@shared/contract/set-up';
import { EmptyState } from '../../../ui/empty-state';
import { ListTable, type Column } from '../common/list-table';
import { QUANTITIES } from '../common/quantity';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { withUnit } from '../common/with-unit';
import { beamPlace } from './beam-place';

type BeamRow = SetUp['beams'][number] & { readonly cloth: string; readonly place: string };

/** The warps on their beams: in store, on a loom, woven out. */
@Component({
  selector: 'app-beams-page',
  imports: [EmptyState, ListTable, MatButton, MatIcon, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="Beams"
      words="Warps on their beams. A beam in store is offered when a loom is gaited; its length says when the warp will be out."
    >
      @if (cloths() > 0) {
        <a matButton="filled" routerLink="new"><mat-icon svgIcon="add" aria-hidden="true" /> Add a beam</a>
      }
    </app-room-heading>
    @if (saved()) {
      <p class="flag good said" role="status">{{ saved() }} is saved.</p>
    }
    @if (rows().length > 0) {
      <app-list-table
        what="beams"
        [rows]="rows()"
        [columns]="columns()"
        [current]="at() ?? null"
        (opened)="open($event.id)"
      />
    } @else if (cloths() > 0) {
      <app-empty-state
        heading="No beam yet"
        words="Add the beams that are in store and on the looms, each with the length of its warp."
      />
    } @else {
      <app-empty-state heading="No cloth yet" words="A beam is of a cloth. Add the cloth first.">
        <a matButton="filled" routerLink="/set-up/cloths/new">Add a cloth</a>
      </app-empty-state>
    }
  `,
  styleUrl: '../common/room.scss',
})
export class BeamsPage {
  /** From the address: the beam that was saved last. */
  readonly at = input<string>();

  private readonly store = inject(SetUpStore);
  private readonly router = inject(Router);

  protected readonly cloths = computed(() => this.store.known().cloths.length);
  protected readonly rows = computed<readonly BeamRow[]>(() => {
    const { beams, cloths, looms } = this.store.known();
    return beams.map((beam) => ({
      ...beam,
      cloth: cloths.find(({ id }) => id === beam.clothId)?.name ?? '–',
      place: beamPlace(beam, looms),
    }));
  });
  protected readonly saved = computed(() => {
    const row = this.rows().find(({ id }) => id === this.at());
    return row ? `Beam ${row.name}` : '';
  });
  protected readonly columns = computed<readonly Column<BeamRow>[]>(() => {
    const length = QUANTITIES.length[this.store.units()];
    return [
      { key: 'name', head: 'Beam', text: (row) => row.name },
      { key: 'cloth', head: 'Cloth', text: (row) => row.cloth, share: 1.4 },
      {
        key: 'length',
        head: 'Warp on it',
        text: (row) => withUnit(row.lengthM, length),
        sort: (row) => row.lengthM,
        figure: true,
      },
      {
        key: 'thrum',
        head: 'Thrum',
        text: (row) => withUnit(row.thrumM, length),
        sort: (row) => row.thrumM,
        figure: true,
      },
      { key: 'place', head: 'Where', text: (row) => row.place },
    ];
  });

  protected async open(id: string): Promise<void> {
    await this.router.navigate(['/set-up/beams', id]);
  }
}
