import type { EntityManager } from 'typeorm';

type Value = string | number | null;

/** Rows a statement; few sizes, so that few statements are prepared. A repository's insert is five times slower. */
const CHUNKS = [64, 8, 1] as const;

/** Inserts (or replaces) many rows of one table by multi-row statements. Only inside the writer. */
export async function insertRows(
  tx: EntityManager,
  table: string,
  columns: readonly string[],
  rows: readonly (readonly Value[])[],
  verb: 'INSERT' | 'INSERT OR REPLACE' | 'INSERT OR IGNORE' = 'INSERT',
): Promise<void> {
  const names = columns.map((column) => `"${column}"`).join(', ');
  const one = `(${columns.map(() => '?').join(', ')})`;
  let next = 0;
  for (const size of CHUNKS) {
    const sql = `${verb} INTO "${table}" (${names}) VALUES ${Array<string>(size).fill(one).join(', ')}`;
    while (rows.length - next >= size) {
      await tx.query(sql, rows.slice(next, next + size).flat());
      next += size;
    }
  }
}

/** A list as one bound value, for `IN (SELECT value FROM json_each(?))`: one statement whatever its length. */
export function list(values: Iterable<string | number>): string {
  return JSON.stringify([...values]);
}

/** Appends to a list in a map. */
export function push<K, V>(map: Map<K, V[]>, key: K, value: V): void {
  const found = map.get(key);
  if (found) found.push(value);
  else map.set(key, [value]);
}

/** Adds to a set in a map. */
export function addTo<K, V>(map: Map<K, Set<V>>, key: K, value: V): void {
  const found = map.get(key);
  if (found) found.add(value);
  else map.set(key, new Set([value]));
}
