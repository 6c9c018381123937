import type { EntityManager } from 'typeorm';
import type { Weeks } from '../../../shared/contract/reports.js';
import { addTo } from '../book/bulk.js';
import { countInterval } from '../book/group-of-lines.js';
import { mondayOf } from '../book/line-row.js';
import { COUNTED_SUMS, figuresOfSums, type CountedSums } from './counted-sums.js';
import { dispersionOf } from './dispersion.js';
import type { Reports } from './report-reader.js';

const WEEK = 7 * 86_400_000;

/** Looms, or rows, week over week: ratios of sums over closed shifts. Open ones are counted, not shown. */
export async function weeksReport(from: EntityManager, input: Reports['weeks']['input']): Promise<Weeks> {
  const { shedId, by } = input;
  const span = { from: mondayOf(input.from), to: mondayOf(input.to) };
  const weeks = mondaysBetween(span.from, span.to);
  const key = by === 'loom' ? 'l."loomId"' : 'l."row"';
  const closedLines = `"loom_line" l JOIN "shift" s ON s."key" = l."shiftKey"
    WHERE l."shedId" = ? AND l."week" BETWEEN ? AND ? AND s."state" = 'closed'`;
  const asked = [shedId, span.from, span.to];
  const cells = await from.query<(CountedSums & { key: string | number; week: string })[]>(
    `SELECT ${key} AS "key", l."week" AS "week", ${COUNTED_SUMS} FROM ${closedLines} GROUP BY 1, 2`,
    asked,
  );
  const totals = await from.query<(CountedSums & { week: string })[]>(
    `SELECT l."week" AS "week", ${COUNTED_SUMS} FROM ${closedLines} GROUP BY 1`,
    asked,
  );
  const clothNames = new Map<string, Set<string>>();
  const cloths = await from.query<{ key: string | number; name: string }[]>(
    `SELECT DISTINCT ${key} AS "key", c."name" AS "name"
       FROM "loom_line" l JOIN "shift" s ON s."key" = l."shiftKey" JOIN "cloth" c ON c."id" = l."clothId"
      WHERE l."shedId" = ? AND l."week" BETWEEN ? AND ? AND s."state" = 'closed' ORDER BY c."name"`,
    asked,
  );
  for (const cloth of cloths) addTo(clothNames, String(cloth.key), cloth.name);
  const interval = countInterval(await dispersionOf(from, shedId, span));
  const cellOf = new Map(cells.map(({ key: of, week, ...sums }) => [`${of} ${week}`, sums]));
  const totalOf = new Map(totals.map(({ week, ...sums }) => [week, sums]));
  const figures = (sums: CountedSums | undefined) => (sums ? figuresOfSums(sums, interval) : null);
  return {
    by,
    weeks,
    rows: (await rowsOf(from, shedId, by, new Set(cells.map((cell) => String(cell.key))))).map((row) => ({
      ...row,
      clothNames: [...(clothNames.get(row.key) ?? [])],
      cells: weeks.map((week) => figures(cellOf.get(`${row.key} ${week}`))),
    })),
    total: weeks.map((week) => figures(totalOf.get(week))),
    openShifts: await openShifts(from, shedId, span),
  };
}

/** Rows of the table in the order of the shed. */
async function rowsOf(
  from: EntityManager,
  shedId: string,
  by: 'loom' | 'row',
  keys: ReadonlySet<string>,
): Promise<{ key: string; label: string }[]> {
  if (by === 'row')
    return [...keys].sort((a, b) => Number(a) - Number(b)).map((key) => ({ key, label: key }));
  const looms = await from.query<{ id: string; number: number }[]>(
    `SELECT "id", "number" FROM "loom" WHERE "shedId" = ? ORDER BY "number", "id"`,
    [shedId],
  );
  return looms
    .filter((loom) => keys.has(loom.id))
    .map((loom) => ({ key: loom.id, label: String(loom.number) }));
}

/** Shifts that were worked and are not closed. */
async function openShifts(
  from: EntityManager,
  shedId: string,
  span: { readonly from: string; readonly to: string },
): Promise<number> {
  const sunday = new Date(Date.parse(`${span.to}T00:00Z`) + WEEK - 1).toISOString().slice(0, 10);
  const [row] = await from.query<{ open: number }[]>(
    `SELECT COUNT(*) AS "open" FROM "shift" WHERE "shedId" = ? AND "date" BETWEEN ? AND ? AND "state" = 'open'
      AND EXISTS (SELECT 1 FROM "loom_line" WHERE "shiftKey" = "shift"."key")`,
    [shedId, span.from, sunday],
  );
  return row?.open ?? 0;
}

function mondaysBetween(from: string, to: string): string[] {
  const mondays: string[] = [];
  for (let at = Date.parse(`${from}T00:00Z`); at <= Date.parse(`${to}T00:00Z`); at += WEEK)
    mondays.push(new Date(at).toISOString().slice(0, 10));
  return mondays;
}
