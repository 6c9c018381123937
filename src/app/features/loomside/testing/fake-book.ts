import { signal } from '@angular/core';
import { resolveCorrections } from '@shared/entries/corrections';
import type { BookEntry, Entry } from '@shared/entries/entry';
import type { LoomLine } from '@shared/entries/loom-line';
import { projectLine } from '@shared/entries/projection';
import {
  aClothVersion,
  aFitting,
  aLoomVersion,
  aShift,
  at,
  SHED_ID,
  someCauses,
  WEAVER_ID,
} from '@shared/testing/builders';
import type { Loom, Shift } from '@shared/contract/reference';
import { newId } from '../../../core/ids';
import type { OwnEntry } from '../../../offline/book-view';
import { numberEntry, stampDraft, type EntryDraft } from '../../../offline/entry-draft';
import type { LastReading } from '../../../offline/last-reading';
import { lastReadingOf } from '../../../offline/last-reading';
import { openCallOf } from '../../../offline/open-call';

export function aLoom(number: number): Loom {
  return {
    id: `loom-${number}`,
    shedId: SHED_ID,
    number,
    row: 1,
    position: number,
    alley: 'A',
    from: at(-100_000),
    until: null,
  };
}

/** 11:00 in London, five hours into the builders' morning shift. */
export class FakeClock {
  readonly at = signal(at(5 * 60));
  readonly tick = this.at.asReadonly();
  readonly offset = signal(0).asReadonly();
  now(): number {
    return this.at();
  }
  correctedNow(): number {
    return this.at();
  }
}

/**
 * Stands for `OfflineBook` in specs of screens: keeps entries in memory, but stamps and checks them and projects their
 * lines by the application's own code. A save can be made to wait or to fail.
 */
export class FakeBook {
  readonly entries = signal<readonly BookEntry[]>([]);
  readonly states = signal<ReadonlyMap<string, OwnEntry['state']>>(new Map());
  readonly ready = signal(true);
  readonly shifts = signal<readonly Shift[]>([aShift()]);
  readonly allLooms = [1, 2, 3].map(aLoom);
  readonly set = signal<readonly Loom[]>(this.allLooms.slice(0, 2));
  /** While set, nothing is saved until it resolves. */
  gate: Promise<void> = Promise.resolve();
  failure: Error | null = null;
  private seq = 0;

  readonly looms = signal(this.allLooms).asReadonly();
  readonly causes = signal(someCauses()).asReadonly();
  readonly people = signal([
    {
      id: WEAVER_ID,
      worksNumber: '7',
      name: 'Nuala Doran',
      shortName: 'Nuala D.',
      roles: ['weaver'] as const,
      usualSet: ['loom-1', 'loom-2'],
    },
  ]).asReadonly();
  readonly reference = signal({
    mill: { name: 'Mill', timeZone: 'Europe/London', units: 'metric' as const },
    sheds: [],
    looms: this.allLooms,
    loomVersions: [],
    cloths: [{ id: 'cloth-1', name: 'Glebe 42' }],
    clothVersions: [],
    warps: [],
    causeVersions: someCauses(),
  }).asReadonly();

  constructor(private readonly clock: FakeClock) {}

  currentShift = (): Shift | null =>
    this.shifts().find((shift) => shift.startsAt <= this.clock.tick() && this.clock.tick() < shift.endsAt) ??
    null;
  mySet = () => this.setOf(WEAVER_ID, this.currentShift());

  setOf(personId: string | null, shift: Shift | null): readonly Loom[] {
    const weavers = new Map(this.set().map((loom) => [loom.id, WEAVER_ID as string | null]));
    for (const { entry } of this.entries())
      if (entry.kind === 'assign' && entry.shiftKey === shift?.key)
        for (const loomId of entry.loomIds) {
          weavers.delete(loomId);
          weavers.set(loomId, entry.weaverId);
        }
    return [...weavers].flatMap(([loomId, weaverId]) =>
      weaverId === personId ? this.allLooms.filter((loom) => loom.id === loomId) : [],
    );
  }

  lineOf(loomId: string, shift: Shift | null = this.currentShift()): LoomLine | null {
    if (!shift) return null;
    return projectLine({
      shift,
      previous: this.shifts().find((other) => other.endsAt === shift.startsAt) ?? null,
      next: this.shifts().find((other) => other.startsAt === shift.endsAt) ?? null,
      loomId,
      looms: this.allLooms,
      entries: this.entries(),
      loomVersions: [aLoomVersion({ loomId, id: `${loomId}.1` })],
      clothVersions: [aClothVersion()],
      causeVersions: someCauses(),
      fittings: [aFitting({ loomId })],
    });
  }

  lastReading(loomId: string): LastReading | null {
    return lastReadingOf(
      resolveCorrections(this.entries()).filter(
        (one) => 'loomId' in one.entry && one.entry.loomId === loomId,
      ),
    );
  }

  openCall(loomId: string) {
    const open = new Set(
      this.lineOf(loomId)
        ?.stops.filter((stop) => stop.until === null)
        .map((stop) => stop.id),
    );
    const mine = resolveCorrections(this.entries()).filter(
      (one) => 'loomId' in one.entry && one.entry.loomId === loomId,
    );
    const call = openCallOf(mine, open);
    return call && { ...call, state: this.states().get(call.id) ?? ('waiting' as const) };
  }

  recentOf(loomId: string): readonly OwnEntry[] {
    return resolveCorrections(this.entries())
      .filter((one) => 'loomId' in one.entry && one.entry.loomId === loomId)
      .map((one) => ({
        id: one.root.entry.id,
        entry: one.entry,
        at: one.at,
        until: one.until,
        voided: one.voided,
        state: this.states().get(one.root.entry.id) ?? ('waiting' as const),
        basedOn: one.latestCorrectionId,
      }))
      .reverse();
  }

  commonCauses(loomId: string): readonly string[] {
    return this.entries().flatMap(({ entry }) =>
      (entry.kind === 'stop' || entry.kind === 'standing') && entry.loomId === loomId ? entry.cause : [],
    );
  }

  notSent(loomId: string): number {
    return this.entries().filter(({ entry }) => 'loomId' in entry && entry.loomId === loomId).length;
  }
  weaverOf = (): string | null => null;
  loomVersionOf = (loomId: string) => aLoomVersion({ loomId, id: `${loomId}.1` });
  basedOn = (): string | undefined => undefined;

  async log(draft: EntryDraft): Promise<Entry> {
    const [entry] = await this.write([draft], undefined);
    if (!entry) throw new Error('nothing was logged');
    return entry;
  }

  logAll(drafts: readonly EntryDraft[]): Promise<Entry[]> {
    return this.write(drafts, newId());
  }

  undo(id: string, reason = 'Taken back'): Promise<Entry> {
    return this.log({ kind: 'void', targetId: id, reason });
  }

  undoBatch(batchId: string, reason = 'Taken back'): Promise<Entry> {
    return this.log({ kind: 'void', targetBatchId: batchId, reason });
  }

  /** What was logged, newest last. */
  get logged(): readonly Entry[] {
    return this.entries().map((book) => book.entry);
  }

  private async write(drafts: readonly EntryDraft[], batchId: string | undefined): Promise<Entry[]> {
    await this.gate;
    if (this.failure) throw this.failure;
    const now = this.clock.now();
    const entries = drafts.map((draft) =>
      numberEntry(
        stampDraft(draft, {
          shedId: SHED_ID,
          by: WEAVER_ID,
          grantId: 'grant-1',
          deviceId: 'tablet-1',
          now,
          clock: undefined,
          newId,
          steppedSince: () => false,
          ...(batchId !== undefined && { batchId }),
        }),
        ++this.seq,
      ),
    );
    const shiftKey = this.currentShift()?.key ?? null;
    this.entries.update((known) => [
      ...known,
      ...entries.map((entry) => ({
        entry,
        at: entry.at,
        until: entry.kind === 'stop' ? (entry.until ?? null) : null,
        shiftKey,
      })),
    ]);
    return entries;
  }
}
