import { randomBytes } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { ChangeRow } from '../../database/entities/index.js';
import { insertRows } from './bulk.js';

/** Chance that a book and its copy do not share once they have gone apart. */
export function newMark(): string {
  return randomBytes(9).toString('base64url');
}

/** Numbers what devices may see, once a transaction for each thing. */
export class ChangeLog {
  private readonly rows = new Map<string, [string | null, ChangeRow['kind'], string]>();

  add(shedId: string | null, kind: ChangeRow['kind'], ref: string): void {
    this.rows.set(`${kind} ${ref}`, [shedId, kind, ref]);
  }

  /** The sheds concerned (null: the whole mill) and the last number. */
  async write(tx: EntityManager): Promise<{ shedIds: (string | null)[]; seq: number | null }> {
    const rows = [...this.rows.values()];
    this.rows.clear();
    if (rows.length === 0) return { shedIds: [], seq: null };
    const mark = newMark();
    await insertRows(
      tx,
      'change',
      ['shedId', 'kind', 'ref', 'mark'],
      rows.map((row) => [...row, mark]),
    );
    const [last] = await tx.query<{ seq: number }[]>(`SELECT MAX("seq") AS "seq" FROM "change"`);
    return { shedIds: [...new Set(rows.map(([shedId]) => shedId))], seq: last?.seq ?? null };
  }
}
