/** A repair of one loom, and the loom's shift that it fell in, counted in order of time. */
export interface CountedRepair {
  readonly id: string;
  readonly cause: string;
  readonly shift: number;
}

/** "Third picking repair in 9 shifts". */
export interface Repeat {
  readonly nth: number;
  /** From the shift of the first of them to its own, both counted. */
  readonly shifts: number;
}

/** Repairs for the same cause further apart than so many shifts of the loom are no repeat. */
export const REPEAT_SHIFTS = 21;

/**
 * Which repairs of a loom are repeats: for the same cause as one within `REPEAT_SHIFTS` before it. The count goes on
 * for as long as each follows the last within that many shifts.
 *
 * @param repairs in order of time
 */
export function repeatsAmong(repairs: readonly CountedRepair[]): ReadonlyMap<string, Repeat> {
  const runs = new Map<string, { first: number; last: number; nth: number }>();
  const repeats = new Map<string, Repeat>();
  for (const { id, cause, shift } of repairs) {
    const run = runs.get(cause);
    if (!run || shift - run.last >= REPEAT_SHIFTS) {
      runs.set(cause, { first: shift, last: shift, nth: 1 });
      continue;
    }
    run.nth += 1;
    run.last = shift;
    repeats.set(id, { nth: run.nth, shifts: shift - run.first + 1 });
  }
  return repeats;
}
