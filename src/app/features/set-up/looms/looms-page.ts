import { ChangeDetectionStrategy, Component, computed, inject, linkedSignal, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { inForceAt, type Loom, type LoomVersion } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { ListTable, type Column } from '../common/list-table';
import { QUANTITIES, textOf } from '../common/quantity';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { Unsaved } from '../common/unsaved';
import { AddLoomsForm } from './add-looms-form';
import { AlleysList } from './alleys-list';
import { ArrangePlan } from './arrange-plan';
import { LoomPanel } from './loom-panel';
import { PlanGrid } from './plan-grid';
import { ShedForm } from './shed-form';

type Act = 'none' | 'add-shed' | 'rename-shed' | 'add-looms' | 'arrange';

interface LoomListRow extends Loom {
  readonly ppm: number | null;
  readonly reedSpace: number | null;
}

/** Sheds and their looms on the floor plan or as a list; what is chosen there can be changed beneath. */
@Component({
  selector: 'app-looms-page',
  imports: [
    AddLoomsForm,
    AlleysList,
    ArrangePlan,
    EmptyState,
    ListTable,
    LoomPanel,
    MatButton,
    PlanGrid,
    RoomHeading,
    ShedForm,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './looms-page.html',
  styleUrl: './looms-page.scss',
})
export class LoomsPage {
  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly unsaved = inject(Unsaved);

  protected readonly sheds = computed(() => this.store.known().sheds);
  private readonly wanted = signal<string | null>(null);
  protected readonly shed = computed(
    () => this.sheds().find((shed) => shed.id === this.wanted()) ?? this.sheds()[0] ?? null,
  );
  protected readonly act = signal<Act>('none');
  protected readonly view = signal<'plan' | 'list'>('plan');
  /** Out of use too: for their history, or to let one stay after all. */
  protected readonly withGone = signal(false);
  protected readonly inUse = computed(() => {
    const now = this.clock.tick();
    return this.ownLooms().filter((loom) => loom.until === null || loom.until > now);
  });
  private readonly ownLooms = computed(() =>
    this.store
      .known()
      .looms.filter((loom) => loom.shedId === this.shed()?.id)
      .sort((a, b) => a.number - b.number),
  );
  protected readonly gone = computed(() => this.ownLooms().length - this.inUse().length);
  private readonly shedId = computed(() => this.shed()?.id ?? '');
  protected readonly selected = linkedSignal<string, ReadonlySet<string>>({
    source: this.shedId,
    computation: () => new Set(),
  });
  protected readonly chosen = computed(() => this.ownLooms().filter((loom) => this.selected().has(loom.id)));
  protected readonly rows = computed<readonly LoomListRow[]>(() => {
    const now = this.clock.tick();
    const looms = this.withGone() ? this.ownLooms() : this.inUse();
    const byLoom = new Map<string, LoomVersion[]>();
    for (const version of this.store.known().loomVersions)
      byLoom.set(version.loomId, [...(byLoom.get(version.loomId) ?? []), version]);
    return looms.map((loom) => {
      const own = byLoom.get(loom.id) ?? [];
      const version = inForceAt(own, now) ?? own[0];
      return { ...loom, ppm: version?.ppm ?? null, reedSpace: version?.reedSpaceCm ?? null };
    });
  });
  protected readonly columns = computed<readonly Column<LoomListRow>[]>(() => {
    const width = QUANTITIES.width[this.store.units()];
    return [
      { key: 'number', head: 'Loom', text: (loom) => String(loom.number), sort: (loom) => loom.number },
      { key: 'row', head: 'Row', text: (loom) => String(loom.row), sort: (loom) => loom.row, figure: true },
      {
        key: 'position',
        head: 'Place',
        text: (loom) => String(loom.position),
        sort: (loom) => loom.position,
        figure: true,
      },
      { key: 'alley', head: 'Alley', text: (loom) => loom.alley },
      {
        key: 'ppm',
        head: 'Picks/min',
        text: (loom) => (loom.ppm === null ? '–' : String(loom.ppm)),
        sort: (loom) => loom.ppm ?? -1,
        figure: true,
      },
      {
        key: 'reed',
        head: `Reed space, ${width.unit}`,
        text: (loom) => (loom.reedSpace === null ? '–' : textOf(loom.reedSpace, width)),
        sort: (loom) => loom.reedSpace ?? -1,
        figure: true,
      },
      ...(this.withGone()
        ? [
            {
              key: 'until',
              head: 'Use',
              text: (loom: Loom) => (loom.until === null ? 'in use' : 'ends or ended'),
            },
          ]
        : []),
    ];
  });

  protected readonly none: ReadonlySet<string> = new Set();
  protected readonly only = (id: string): ReadonlySet<string> => new Set([id]);

  protected async chooseShed(id: string): Promise<void> {
    if (await this.unsaved.mayLeave()) {
      this.wanted.set(id);
      this.act.set('none');
    }
  }

  protected async begin(act: Act): Promise<void> {
    if (!(await this.unsaved.mayLeave())) return;
    this.selected.set(new Set());
    this.act.set(act);
  }

  protected shedSaved(id: string): void {
    this.wanted.set(id);
    this.act.set('none');
  }

  protected async choose(selected: ReadonlySet<string>): Promise<void> {
    if (await this.unsaved.mayLeave()) this.selected.set(selected);
  }

  protected toggle(id: string): Promise<void> {
    const selected = new Set(this.selected());
    if (!selected.delete(id)) selected.add(id);
    return this.choose(selected);
  }

  protected chooseAll(): Promise<void> {
    return this.choose(new Set(this.inUse().map((loom) => loom.id)));
  }

  protected chooseRow(row: number): Promise<void> {
    return this.choose(
      new Set(
        this.inUse()
          .filter((loom) => loom.row === row)
          .map((loom) => loom.id),
      ),
    );
  }

  protected readonly rowNumbers = computed(() =>
    [...new Set(this.inUse().map((loom) => loom.row))].sort((a, b) => a - b),
  );
}
