import type { Stand } from '../../../shared/entries/projection-input.js';
import { loomsNamedBy } from '../../../shared/entries/entry.js';
import type { Shift } from '../../../shared/contract/reference.js';
import { addTo } from './bulk.js';
import type { EntryWeb, StoredEntry } from './entry-store.js';
import type { ChangedFitting } from './fitting-store.js';
import type { MillFacts } from './mill-facts.js';
import type { Shifts } from './which-shift.js';

/** A line that an entry may change. */
export interface Touch {
  readonly entryId: string;
  readonly shiftKey: string;
  readonly loomId: string;
  /** It belongs to this shift by its moment or by name; else it reaches into it (a long stop, a neighbour's reading). */
  readonly direct: boolean;
}

/** What arrives in the book (or begins to count), and what that touches. */
export class TouchedLines {
  private readonly touches = new Map<string, Touch>();
  /** Timed stops whose intervals may change, with the entries that change them. */
  readonly stops = new Map<string, { stop: StoredEntry; by: Set<StoredEntry> }>();
  /** Looms whose fittings may change, likewise. */
  readonly fittedLooms = new Map<string, Set<StoredEntry>>();

  constructor(
    private readonly web: EntryWeb,
    private readonly facts: MillFacts,
    private readonly shifts: Shifts,
  ) {}

  get all(): Touch[] {
    return [...this.touches.values()];
  }

  /** Lines by moment, by name and beside; collects the stops and looms that `addStands` and `addFittings` follow up. */
  async addEntry(entry: StoredEntry): Promise<void> {
    for (const root of this.web.rootsOf(entry)) {
      const { looms, shiftKeys } = this.placesOf(root);
      switch (root.kind) {
        case 'note':
        case 'pay-word':
        case 'care':
        case 'close':
        case 'reopen':
        case 'accept':
        case 'refuse':
          break;
        case 'reading':
        case 'sheet':
        case 'decide':
          for (const shiftKey of shiftKeys) {
            this.touchAll(entry, root, shiftKey, looms);
            for (const neighbour of await this.neighbours(root, shiftKey))
              this.touchAll(entry, root, neighbour, looms);
          }
          break;
        case 'warp-change':
          for (const shiftKey of shiftKeys) this.touchAll(entry, root, shiftKey, looms);
          for (const loomId of looms) addTo(this.fittedLooms, loomId, entry);
          break;
        default: {
          for (const shiftKey of shiftKeys) this.touchAll(entry, root, shiftKey, looms);
          const stop = this.web.stopOf(root);
          if (!stop) break;
          const known = this.stops.get(stop.id) ?? { stop, by: new Set() };
          known.by.add(entry);
          this.stops.set(stop.id, known);
        }
      }
    }
  }

  /** Lines that a stop overlapped before, or overlaps now. */
  async addStands(stands: readonly Stand[]): Promise<void> {
    const sheds = new Map<string, Stand[]>();
    for (const stand of stands) {
      const shedId = this.facts.looms.get(stand.loomId)?.shedId;
      if (shedId !== undefined) sheds.set(shedId, [...(sheds.get(shedId) ?? []), stand]);
    }
    for (const [shedId, ofShed] of sheds) {
      const from = Math.min(...ofShed.map((one) => one.from));
      const until = ofShed.some((one) => one.until === null)
        ? null
        : Math.max(...ofShed.map((one) => one.until ?? one.from)) + 1;
      const shifts = await this.shifts.withLines(shedId, from, until);
      for (const stand of ofShed)
        for (const shift of shifts)
          if (shift.startsAt <= (stand.until ?? Infinity) && shift.endsAt > stand.from)
            for (const entry of this.stops.get(stand.stopId)?.by ?? [])
              this.touchRoots(entry, shift.key, stand.loomId);
    }
  }

  /** Lines of the looms from a changed fitting until the next. */
  async addFittings(changed: readonly ChangedFitting[]): Promise<void> {
    for (const { loomId, from, until } of changed) {
      const shedId = this.facts.looms.get(loomId)?.shedId;
      if (shedId === undefined) continue;
      for (const shift of await this.shifts.withLines(shedId, from, until))
        for (const entry of this.fittedLooms.get(loomId) ?? []) this.touchRoots(entry, shift.key, loomId);
    }
  }

  /** Looms and shifts of a root entry, as logged and as amended. */
  private placesOf(root: StoredEntry): { looms: Set<string>; shiftKeys: Set<string> } {
    const looms = new Set(loomsNamedBy(root.entry, [...this.facts.looms.values()]));
    const shiftKeys = new Set(root.shiftKey === null ? [] : [root.shiftKey]);
    for (const amend of this.web.amendmentsOf(root)) {
      if (amend.entry.kind !== 'amend') continue;
      const { loomId } = amend.entry.change;
      if (loomId !== undefined) looms.add(loomId);
      if (amend.changedAt !== null && amend.shiftKey !== null) shiftKeys.add(amend.shiftKey);
    }
    return { looms, shiftKeys };
  }

  /**
   * A reading at a shift's end serves the next one's start (or shows what was woven in between), one at the start
   * serves the end of the shift that adjoins before; a reset counts where it was read, which may be in either. A
   * register a shift stands where its own shift last left it.
   */
  private async neighbours(root: StoredEntry, shiftKey: string): Promise<string[]> {
    const { entry } = root;
    const shift = await this.shifts.named(shiftKey);
    if (!shift) return [];
    const boundary =
      entry.kind === 'reading'
        ? entry.boundary
        : entry.kind === 'decide' && 'boundary' in entry.about
          ? entry.about.boundary
          : null;
    const either = entry.kind === 'sheet' || boundary === 'reset';
    const atStart = either || boundary === 'start';
    const atEnd = either || boundary === 'end';
    const found: (Shift | null)[] = [];
    if (atStart) {
      const before = await this.shifts.beforeOf(shift);
      if (before?.endsAt === shift.startsAt) found.push(before);
    }
    if (atEnd) found.push(await this.shifts.afterOf(shift));
    if (atEnd && entry.kind === 'reading') found.push(await this.shifts.nextOfPattern(shift));
    return found.flatMap((one) => one?.key ?? []);
  }

  private touchRoots(entry: StoredEntry, shiftKey: string, loomId: string): void {
    const direct = this.web.rootsOf(entry).some((root) => isDirect(entry, root, shiftKey));
    this.touch({ entryId: entry.id, shiftKey, loomId, direct });
  }

  private touchAll(entry: StoredEntry, root: StoredEntry, shiftKey: string, looms: Iterable<string>): void {
    const direct = isDirect(entry, root, shiftKey);
    for (const loomId of looms) this.touch({ entryId: entry.id, shiftKey, loomId, direct });
  }

  private touch(touch: Touch): void {
    const key = `${touch.entryId} ${touch.shiftKey} ${touch.loomId}`;
    if (touch.direct || !this.touches.has(key)) this.touches.set(key, touch);
  }
}

function isDirect(entry: StoredEntry, root: StoredEntry, shiftKey: string): boolean {
  return root.shiftKey === shiftKey || (entry.changedAt !== null && entry.shiftKey === shiftKey);
}
