import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { DataSource, EntityManager } from 'typeorm';
import { readFileSync } from 'node:fs';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, MONDAY } from '../../testing/test-entries.js';
import { pull } from '../sync/pull.service.js';
import type { Reports } from './report-reader.js';
import { REPORTS, runReport } from './run-report.js';

/** Tables that grow with every shift: a report that reads one from end to end grows with history. */
const GROWING = ['entry', 'entry_loom', 'loom_line', 'change', 'stand'];

const ASKED: { readonly [R in keyof Reports]: readonly Reports[R]['input'][] } = {
  shifts: [{ shedId: 'north', from: '2026-03-01', to: '2026-03-31' }],
  sheet: [
    { shiftKey: EARLY, asOf: MONDAY + HOUR },
    { shiftKey: 'north:2026-03-12:north-night', asOf: MONDAY + HOUR },
  ],
  sheetPdf: [{ shiftKey: EARLY, asOf: MONDAY + HOUR }],
  loomRecord: [{ shiftKey: EARLY, loomId: 'n1', asOf: MONDAY + HOUR }],
  heldEntries: [{ shiftKey: EARLY, asOf: MONDAY + HOUR }],
  signedVersions: [{ shiftKey: EARLY }],
  loomHistory: [{ loomId: 'n1', asOf: MONDAY + HOUR, names: true }],
  tacklerAhead: [{ shedId: 'north', asOf: MONDAY + HOUR }],
  usual: [{ shedId: 'north', asOf: MONDAY + HOUR }],
  weeks: [
    { shedId: 'north', by: 'loom', from: '2026-01-05', to: '2026-03-30' },
    { shedId: 'north', by: 'row', from: '2026-01-05', to: '2026-03-30' },
  ],
};

interface Plan {
  detail: string;
}

/** The steps of a statement's plan that read a growing table whole, under whatever alias. */
async function scans(data: DataSource, sql: string): Promise<string[]> {
  const parameters = Array<null>((sql.match(/\?/g) ?? []).length).fill(null);
  const plan = await data.query<Plan[]>(`EXPLAIN QUERY PLAN ${sql}`, parameters);
  const aliases = [...sql.matchAll(/(?:FROM|JOIN)\s+"(\w+)"(?:\s+(?:AS\s+)?"?(\w+)"?)?/gi)];
  const growing = new Set(GROWING);
  for (const [, table, alias] of aliases)
    if (table !== undefined && alias !== undefined && growing.has(table)) growing.add(alias);
  return plan
    .map((step) => step.detail)
    .filter((detail) => growing.has(/^SCAN "?(\w+)"?/.exec(detail)?.[1] ?? ''));
}

describe('query plans', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
    await book.push([
      entry('reading', { loomId: 'n1', shiftKey: EARLY, boundary: 'start', value: 1, at: MONDAY }),
      entry('stop', { loomId: 'n1', cause: 'picking', count: 1, at: MONDAY + HOUR }),
      entry('repair', { who: 'tackler', loomId: 'n1', cause: 'picking', at: MONDAY + HOUR }),
      entry('warp-change', {
        who: 'tackler',
        loomId: 'n1',
        how: 'gaiting',
        warpId: null,
        clothId: 'calico',
        at: MONDAY,
      }),
    ]);
  });
  afterEach(() => book.close());

  /** Everything that some work asks the database. */
  const asked = async (work: (from: EntityManager) => Promise<unknown>): Promise<string[]> => {
    const statements = new Set<string>();
    const runner = book.data.createQueryRunner();
    const query = runner.query.bind(runner);
    runner.query = (sql: string, ...rest: never[]) => {
      statements.add(sql);
      return query(sql, ...rest);
    };
    await work(runner.manager);
    runner.query = query;
    return [...statements].filter((sql) => /^\s*SELECT/i.test(sql));
  };
  const expectNoScans = async (statements: readonly string[]) => {
    expect(statements.length).toBeGreaterThan(0);
    for (const sql of statements) expect(await scans(book.data, sql), sql).toEqual([]);
  };

  const cases = Object.keys(REPORTS).flatMap((report) =>
    ASKED[report as keyof Reports].map((input) => [report as keyof Reports, input] as const),
  );
  it.each(cases)('%s reads no growing table from end to end: %j', async (report, input) => {
    await expectNoScans(await asked((from) => runReport(from, report, input)));
  });

  it('a pull neither, whole or from a cursor', async () => {
    const scope = { of: 'floor', shedId: 'north' } as const;
    const pulling = { scope, deviceId: 'tablet-north', epoch: 'e', now: MONDAY + HOUR };
    await expectNoScans(
      await asked(async (manager) => {
        const reads = { manager } as DataSource;
        const { cursor } = await pull(reads, { ...pulling, after: undefined });
        await pull(reads, { ...pulling, after: cursor });
      }),
    );
  });

  it('would be found: a scan under an alias is one', async () => {
    expect(await scans(book.data, `SELECT l."line" FROM "loom_line" l WHERE l."picks" > 1`)).toHaveLength(1);
    expect(await scans(book.data, `SELECT COUNT(*) FROM "entry" WHERE "kind" = 'stop'`)).toHaveLength(1);
  });

  it('covers every report that is there', () => {
    const source = readFileSync(new URL('./report-reader.ts', import.meta.url), 'utf8');
    for (const report of Object.keys(ASKED)) expect(source).toContain(`${report}: { input`);
    expect(Object.keys(ASKED).sort()).toEqual(Object.keys(REPORTS).sort());
  });
});
