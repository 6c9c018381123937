import type { CauseVersion, ClothVersion, Fitting, LoomVersion, Shift } from '../contract/reference.js';
import type { BookEntry } from './entry.js';

/**
 * Everything the projection of one loom line may look at. Lists may be in any order and may hold more than is
 * needed (entries of other shifts, versions of other looms): the projection picks, and its result does not depend
 * on the order. Entries that are held or refused for this shift are left out by the caller.
 */
export interface LineInput {
  readonly shift: Shift;
  /** The shift that ends where this one starts, and the one that starts where it ends, of the same shed. */
  readonly previous: Shift | null;
  readonly next: Shift | null;
  readonly loomId: string;
  /** Rows of all looms of the shed, for shed stops that name a row. */
  readonly looms: readonly { id: string; shedId: string; row: number }[];
  /**
   * Entries of this loom: all that name this shift or fall in it, every timed stop that overlaps it with the
   * entries that name those (resume, call, attend, repair, void, amend), the readings, sheets and decisions of the
   * adjoining shifts, and the last earlier end reading (of this shift's own pattern too, for a clock with one
   * register a shift).
   */
  readonly entries: readonly BookEntry[];
  readonly loomVersions: readonly LoomVersion[];
  readonly clothVersions: readonly ClothVersion[];
  readonly causeVersions: readonly CauseVersion[];
  readonly fittings: readonly Fitting[];
}

/** A timed stop of one loom, as an interval: the read model `stands`, by which overlapping stops are found. */
export interface Stand {
  /** The root entry. */
  readonly stopId: string;
  readonly loomId: string;
  readonly from: number;
  /** Null: still stands. */
  readonly until: number | null;
  readonly cause: string;
}
