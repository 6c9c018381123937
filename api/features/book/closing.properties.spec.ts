import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { EARLY, entry, HOUR, insertTestGrants, MINUTE, MONDAY } from '../../testing/test-entries.js';
import { testServer, type TestServer } from '../../testing/test-server.js';
import { ingestEntries } from './ingest.js';
import { rebuildBook } from './rebuild.js';

/** What may befall a shift after its end, in any order and as often as chance has it. */
type Act =
  | { readonly is: 'close' | 'reopen' | 'decide-all' | 'recalculate' }
  | { readonly is: 'late-stop' | 'late-reading' | 'late-card'; readonly loom: number; readonly n: number }
  | { readonly is: 'take-back'; readonly n: number }
  | { readonly is: 'speed-corrected'; readonly loom: number; readonly n: number };

const loom = fc.integer({ min: 1, max: 3 });
const n = fc.nat({ max: 400 });
const acts = fc.array(
  fc.oneof(
    {
      weight: 4,
      arbitrary: fc.record({ is: fc.constantFrom('close', 'reopen', 'decide-all', 'recalculate') }),
    },
    {
      weight: 6,
      arbitrary: fc.record({ is: fc.constantFrom('late-stop', 'late-reading', 'late-card'), loom, n }),
    },
    { weight: 1, arbitrary: fc.record({ is: fc.constant('take-back'), n }) },
    { weight: 1, arbitrary: fc.record({ is: fc.constant('speed-corrected'), loom, n }) },
  ) as fc.Arbitrary<Act>,
  { minLength: 3, maxLength: 14 },
);

interface Signed {
  readonly version: number;
  readonly totals: string;
}

class Shift {
  private at = MONDAY + 8 * HOUR + 5 * MINUTE;
  private readonly logged: string[] = [];

  constructor(
    private readonly server: TestServer,
    private readonly desk: SetUpDesk,
  ) {}

  async begin(): Promise<void> {
    for (const loomId of ['n1', 'n2', 'n3'])
      await this.push(
        entry('reading', { loomId, shiftKey: EARLY, boundary: 'start', value: 0, at: MONDAY }),
        entry('reading', { loomId, shiftKey: EARLY, boundary: 'end', value: 800, at: MONDAY + 8 * HOUR }),
      );
  }

  async do(act: Act): Promise<void> {
    this.at += MINUTE;
    const at = this.at;
    switch (act.is) {
      case 'close':
        return this.push(entry('close', { who: 'foreman', shiftKey: EARLY, at }));
      case 'reopen':
        return this.push(
          entry('reopen', { who: 'foreman', shiftKey: EARLY, reason: 'A card was found', at }),
        );
      case 'decide-all':
        for (const { entryId } of await this.held())
          await this.push(
            entry(entryId < '5' ? 'accept' : 'refuse', {
              who: 'foreman',
              targetId: entryId,
              reason: 'Asked',
              at,
            }),
          );
        return;
      case 'late-stop':
        return this.log(
          entry('stop', {
            loomId: `n${act.loom}`,
            cause: 'warp-break',
            count: 1,
            at: MONDAY + act.n * MINUTE,
          }),
        );
      case 'late-reading':
        return this.log(
          entry('reading', {
            loomId: `n${act.loom}`,
            shiftKey: EARLY,
            boundary: 'end',
            value: 800 + (act.n % 3),
            at: MONDAY + 8 * HOUR,
          }),
        );
      case 'late-card':
        return this.log(
          entry('sheet', {
            who: 'foreman',
            loomId: `n${act.loom}`,
            shiftKey: EARLY,
            picks: 70_000 + act.n,
            counts: { 'weft-break': act.n % 7 },
            minutes: { gaiting: act.n % 60 },
            at: MONDAY + 8 * HOUR,
            source: 'paper',
          }),
        );
      case 'take-back': {
        const targetId = this.logged[act.n % Math.max(1, this.logged.length)];
        if (targetId === undefined) return;
        return this.push(entry('void', { who: 'foreman', targetId, reason: 'Typed twice', at }));
      }
      case 'speed-corrected':
        await this.desk.change('post', '/looms/versions', {
          loomIds: [`n${act.loom}`],
          effectiveAt: MONDAY - HOUR + act.n * MINUTE,
          facts: { ppm: 150 + (act.n % 90) },
        });
        return;
      case 'recalculate':
        await this.server
          .call('post', '/set-up/recalculate', {
            as: this.desk.actor,
            body: { shedId: 'north', from: '2026-03-09', reason: 'The speed was wrong' },
          })
          .expect(200);
        return;
    }
  }

  async signed(): Promise<readonly Signed[]> {
    return this.server.deps.reads.query<Signed[]>(
      `SELECT "version", "totals" FROM "signed_totals" WHERE "shiftKey" = ? ORDER BY "version"`,
      [EARLY],
    );
  }

  held(): Promise<{ entryId: string }[]> {
    return this.server.deps.reads.query(
      `SELECT "entryId" FROM "entry_hold" WHERE "state" = 'held' ORDER BY "entryId"`,
    );
  }

  private async log(one: { readonly id: string } & object): Promise<void> {
    this.logged.push(one.id);
    await this.push(one);
  }

  private async push(...entries: readonly object[]): Promise<void> {
    const serverNow = this.server.clock.now;
    const { results } = await this.server.deps.writer.write((tx) =>
      ingestEntries(tx, entries, {
        deviceId: null,
        deviceRevoked: false,
        tabletShedId: null,
        sentAt: serverNow,
        serverNow,
      }),
    );
    // A close waits until what is held is decided; nothing else is ever refused.
    for (const one of results) if (one.result === 'refused') expect(one.code).toBe('held-undecided');
  }
}

describe('closing, late entries, reopening, recalculating and closing again', () => {
  it(
    'always leave totals equal to a rebuild, and every signed version as it was',
    { timeout: 240_000 },
    async () => {
      await fc.assert(
        fc.asyncProperty(acts, async (history) => {
          const server = await testServer();
          try {
            await server.deps.writer.write(insertTestGrants);
            const shift = new Shift(server, await setUpDesk(server));
            await shift.begin();
            let before: readonly Signed[] = [];
            for (const act of history) {
              await shift.do(act);
              const now = await shift.signed();
              expect(now.slice(0, before.length)).toEqual(before);
              before = now;
            }
            for (const last of ['decide-all', 'reopen', 'close'] as const) await shift.do({ is: last });
            const signed = await shift.signed();
            expect(signed.slice(0, before.length)).toEqual(before);
            expect(signed.length).toBeGreaterThan(0);
            expect(await shift.held()).toEqual([]);
            expect(await server.deps.writer.write(rebuildBook)).toMatchObject({
              different: [],
              unlikeSigned: [],
              signedShifts: 1,
            });
          } finally {
            await server.close();
          }
        }),
        { numRuns: 15, seed: 20_261_201 },
      );
    },
  );
});
