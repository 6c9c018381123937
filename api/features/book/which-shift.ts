import type { EntityManager } from 'typeorm';
import type { Shift } from '../../../shared/contract/reference.js';
import type { Entry } from '../../../shared/entries/entry.js';
import type { ShiftRow } from '../../database/entities/index.js';

/** Where an entry belongs. */
export interface Place {
  /** Of the shift that it names, as the book has or once had it; null: it never had; undefined: the entry names none. */
  readonly named: Pick<Shift, 'shedId'> | null | undefined;
  /** Null: none is there; the entry waits for one where it needs it. */
  readonly shift: Shift | null;
}

/** A shift's row as the wire has it. */
export function shiftOf(row: ShiftRow): Shift {
  const { mealStartsAt, mealEndsAt, mealLooms } = row;
  return {
    key: row.key,
    shedId: row.shedId,
    date: row.date,
    patternId: row.patternId,
    name: row.name,
    startsAt: row.startsAt,
    endsAt: row.endsAt,
    meal:
      mealStartsAt !== null && mealEndsAt !== null && mealLooms !== null
        ? { startsAt: mealStartsAt, endsAt: mealEndsAt, looms: mealLooms }
        : null,
    state: row.state,
  };
}

/** The shifts of one transaction, read once each. Shifts of one shed never overlap. */
export class Shifts {
  private readonly byKey = new Map<string, Shift | null>();
  private readonly removed = new Map<string, string | null>();
  private readonly before = new Map<string, Shift | null>();
  private readonly after = new Map<string, Shift | null>();
  private readonly ofPattern = new Map<string, Shift | null>();
  private readonly toPattern = new Map<string, Shift | null>();
  private readonly spans = new Map<string, { from: number; until: number; shifts: Shift[] }>();

  constructor(private readonly tx: EntityManager) {}

  async named(key: string): Promise<Shift | null> {
    const known = this.byKey.get(key);
    if (known !== undefined) return known;
    const [row] = await this.tx.query<ShiftRow[]>(`SELECT * FROM "shift" WHERE "key" = ?`, [key]);
    return this.keep(key, row);
  }

  /** Where an entry belongs: the shift that it names, or else the one whose [start, end) holds its moment. */
  async placeOf(entry: Entry, moment: number): Promise<Place> {
    const key = 'shiftKey' in entry ? entry.shiftKey : undefined;
    if (key === undefined) {
      return { named: undefined, shift: await this.at(entry.shedId, moment) };
    }
    const shift = await this.named(key);
    if (shift) return { named: shift, shift };
    const shedId = await this.shedOfRemoved(key);
    return { named: shedId === null ? null : { shedId }, shift: null };
  }

  /** The shed of a shift that was there once and was taken out of the plan; null: there never was one of that key. */
  private async shedOfRemoved(key: string): Promise<string | null> {
    const known = this.removed.get(key);
    if (known !== undefined) return known;
    // Tablets are told of every shift that is made, is another or is no more, under its key.
    const [row] = await this.tx.query<{ shedId: string }[]>(
      `SELECT "shedId" FROM "change" WHERE "kind" = 'shift' AND "ref" = ? LIMIT 1`,
      [key],
    );
    const shedId = row?.shedId ?? null;
    this.removed.set(key, shedId);
    return shedId;
  }

  /** The shift whose [start, end) holds the moment. */
  async at(shedId: string, moment: number): Promise<Shift | null> {
    const day = 86_400_000;
    let span = this.spans.get(shedId);
    if (!span || moment < span.from || moment >= span.until) {
      span = { from: moment - 2 * day, until: moment + 2 * day, shifts: [] };
      const rows = await this.tx.query<ShiftRow[]>(
        `SELECT * FROM "shift" WHERE "shedId" = ? AND "startsAt" >= ? AND "startsAt" < ?`,
        [shedId, span.from - 2 * day, span.until],
      );
      span.shifts = rows.flatMap((row) => this.keep(row.key, row) ?? []);
      this.spans.set(shedId, span);
    }
    const found = span.shifts.find((shift) => shift.startsAt <= moment && moment < shift.endsAt);
    return found ? (this.byKey.get(found.key) ?? null) : null;
  }

  /** The shed's shift before this one, adjoining or not. */
  async beforeOf(shift: Shift): Promise<Shift | null> {
    return this.neighbour(this.before, shift, `"startsAt" < ? ORDER BY "startsAt" DESC`);
  }

  /** The shed's shift after this one, adjoining or not. */
  async afterOf(shift: Shift): Promise<Shift | null> {
    return this.neighbour(this.after, shift, `"startsAt" > ? ORDER BY "startsAt"`);
  }

  /** The last shift of the same pattern before this one: where a register of its own was left. */
  async lastOfPattern(shift: Shift): Promise<Shift | null> {
    return this.neighbour(
      this.ofPattern,
      shift,
      `"startsAt" < ? AND "patternId" = ? ORDER BY "startsAt" DESC`,
    );
  }

  /** The next shift of the same pattern after this one. */
  async nextOfPattern(shift: Shift): Promise<Shift | null> {
    return this.neighbour(this.toPattern, shift, `"startsAt" > ? AND "patternId" = ? ORDER BY "startsAt"`);
  }

  /** Shifts of the shed that have lines and overlap [from, until); until null: to the end of the book. */
  async withLines(shedId: string, from: number, until: number | null): Promise<Shift[]> {
    const rows = await this.tx.query<ShiftRow[]>(
      `SELECT * FROM "shift" WHERE "shedId" = ? AND "startsAt" >= ? AND "startsAt" < ? AND "endsAt" > ?
         AND EXISTS (SELECT 1 FROM "loom_line" WHERE "shiftKey" = "shift"."key") ORDER BY "startsAt"`,
      [shedId, from - 2 * 86_400_000, until ?? Number.MAX_SAFE_INTEGER, from],
    );
    return rows.flatMap((row) => this.keep(row.key, row) ?? []);
  }

  /** Takes over a state that this transaction has just written. */
  changed(key: string, state: Shift['state']): void {
    const shift = this.byKey.get(key);
    if (shift) this.byKey.set(key, { ...shift, state });
    this.before.clear();
    this.after.clear();
    this.ofPattern.clear();
    this.toPattern.clear();
  }

  private async neighbour(known: Map<string, Shift | null>, shift: Shift, where: string) {
    const found = known.get(shift.key);
    if (found !== undefined) return found;
    const [row] = await this.tx.query<ShiftRow[]>(
      `SELECT * FROM "shift" WHERE "shedId" = ? AND ${where} LIMIT 1`,
      where.includes('patternId')
        ? [shift.shedId, shift.startsAt, shift.patternId]
        : [shift.shedId, shift.startsAt],
    );
    const kept = row ? this.keep(row.key, row) : null;
    known.set(shift.key, kept);
    return kept;
  }

  private keep(key: string, row: ShiftRow | undefined): Shift | null {
    const known = this.byKey.get(key);
    if (known) return known;
    const shift = row ? shiftOf(row) : null;
    this.byKey.set(key, shift);
    return shift;
  }
}
