import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { ShiftRow } from '../../database/entities/index.js';
import { Bookkeeper } from './bookkeeper.js';
import { entriesBySeq, EntryWeb } from './entry-store.js';
import { renewFittings } from './fitting-store.js';
import { readMillFacts } from './mill-facts.js';
import { lastSignedTotals, signedTotals } from './signed-totals.js';
import { StandStore } from './stand-store.js';
import { shiftOf } from './which-shift.js';

export interface Rebuilt {
  readonly lines: number;
  readonly stands: number;
  readonly fittings: number;
  readonly signedShifts: number;
  /** Rows of the read models that are not what they were, the first few by name. */
  readonly different: readonly string[];
  /** Closed shifts whose lines do not give the totals that were signed. */
  readonly unlikeSigned: readonly string[];
}

const READ_MODELS = {
  stand: ['stopId', 'loomId'],
  fitting: ['id'],
  loom_line: ['shiftKey', 'loomId'],
} as const;

/** Stops resolved at once. */
const CHUNK = 500;

/**
 * Makes stands, fittings and lines anew from the entries and compares them with what was there, to the byte. What was
 * signed is compared and never written. Runs alone on the book.
 */
export async function rebuildBook(tx: EntityManager): Promise<Rebuilt> {
  const before = await fingerprints(tx);
  for (const table of Object.keys(READ_MODELS)) await tx.query(`DELETE FROM "${table}"`);
  const facts = await readMillFacts(tx);
  const keeper = new Bookkeeper(tx, facts);
  await rebuildStands(tx, new StandStore(tx, facts));
  await renewFittings(tx, [...facts.looms.keys()]);
  const unlikeSigned: string[] = [];
  let signedShifts = 0;
  for (const row of await touchedShifts(tx)) {
    const shift = shiftOf(row);
    const lines = await keeper.lines.write(shift, await keeper.lines.loomsOf(shift));
    if (shift.state !== 'closed') continue;
    signedShifts += 1;
    if ((await lastSignedTotals(tx, shift.key)) !== signedTotals(lines)) unlikeSigned.push(shift.key);
  }
  const after = await fingerprints(tx);
  const names = new Set([...before.keys(), ...after.keys()]);
  const count = (table: string) => [...after.keys()].filter((name) => name.startsWith(`${table} `)).length;
  return {
    lines: count('loom_line'),
    stands: count('stand'),
    fittings: count('fitting'),
    signedShifts,
    different: [...names].filter((name) => before.get(name) !== after.get(name)).sort(),
    unlikeSigned,
  };
}

async function rebuildStands(tx: EntityManager, store: StandStore): Promise<void> {
  const stops = await tx.query<{ seq: number }[]>(
    `SELECT "seq" FROM "entry" WHERE "kind" IN ('stop', 'standing', 'shed-stop') ORDER BY "seq"`,
  );
  for (let at = 0; at < stops.length; at += CHUNK) {
    const chunk = await entriesBySeq(
      tx,
      stops.slice(at, at + CHUNK).map((one) => one.seq),
    );
    const web = new EntryWeb(tx);
    await web.add(chunk);
    await store.write(chunk, await store.resolve(web, chunk));
  }
}

/** Shifts that have lines: an entry falls in them or names them. */
async function touchedShifts(tx: EntityManager): Promise<ShiftRow[]> {
  return tx.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE EXISTS (SELECT 1 FROM "entry" WHERE "shiftKey" = "shift"."key")
      ORDER BY "startsAt", "key"`,
  );
}

/** Rows hashed at once: lines are long, and years of them need not fit in memory. */
const PAGE = 500;

/** Every row of the read models by its name, as a hash of its bytes. */
async function fingerprints(tx: EntityManager): Promise<Map<string, string>> {
  const found = new Map<string, string>();
  for (const [table, keys] of Object.entries(READ_MODELS)) {
    for (let last = 0; ;) {
      const rows = await tx.query<({ place: number } & Record<string, unknown>)[]>(
        `SELECT rowid AS "place", * FROM "${table}" WHERE rowid > ? ORDER BY rowid LIMIT ?`,
        [last, PAGE],
      );
      for (const { place, ...row } of rows) {
        const name = [table, ...keys.map((key) => String(row[key]))].join(' ');
        found.set(name, createHash('sha256').update(JSON.stringify(row)).digest('base64'));
        last = place;
      }
      if (rows.length < PAGE) break;
    }
  }
  return found;
}
