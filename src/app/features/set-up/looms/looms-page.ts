import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { ListTable, type Column } from '../common/list-table';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import type { Loom } from '@shared/contract/reference';

/** Sheds and looms on their floor plan. */
@Component({
  selector: 'app-looms-page',
  imports: [ListTable, RoomHeading],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading heading="Sheds and looms" />
    <app-list-table what="looms" [rows]="looms()" [columns]="columns" />
  `,
  styles: `
    :host {
      display: grid;
      gap: 20px;
    }
  `,
})
export class LoomsPage {
  private readonly store = inject(SetUpStore);
  protected readonly looms = computed(() => this.store.known().looms);
  protected readonly columns: readonly Column<Loom>[] = [
    { key: 'number', head: 'Loom', text: (loom) => String(loom.number), sort: (loom) => loom.number },
    { key: 'row', head: 'Row', text: (loom) => String(loom.row), sort: (loom) => loom.row },
    { key: 'alley', head: 'Alley', text: (loom) => loom.alley },
  ];
}
