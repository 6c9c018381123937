import 'fake-indexeddb/auto';
import { IDBFactory } from 'fake-indexeddb';
import { pullResponseSchema, pushResponseSchema } from '@shared/contract/sync';
import type { Entry } from '@shared/entries/entry';
import { filter, firstValueFrom } from 'rxjs';
import { rmSync } from 'node:fs';
import { exchange, type Fetch } from '../../../src/app/core/exchange';
import { newId } from '../../../src/app/core/ids';
import { BookStore } from '../../../src/app/offline/book-store';
import { stampDraft } from '../../../src/app/offline/entry-draft';
import { LocalDatabase } from '../../../src/app/offline/local-database';
import { Outbox } from '../../../src/app/offline/outbox';
import { REAL_TIMERS } from '../../../src/app/offline/sync-ports';
import { SyncLoop } from '../../../src/app/offline/sync-loop';
import { TEST_NOW } from '../../../api/testing/test-mill.js';
import { VirtualTime } from '../../../src/app/testing/virtual-time';
import { FaultServer } from '../faults/fault-server';
import { grantOf, SECRET, tabletId, templateMill } from '../faults/template-mill';
import { pullQuery } from '../simulated-tablet';

export interface Measured {
  readonly requests: number;
  readonly seconds: number;
  readonly stored: number;
}

/** For the comparison alone: this application sends what waits together. */
class OneAtATime extends Outbox {
  override nextBatch(): Promise<Entry[]> {
    return super.nextBatch(1);
  }
}

/**
 * Sends so many entries, one a request, over a wire that may lose answers, until all are in the book.
 *
 * @param waits with the waits after failures that the application has; else it tries again at once
 */
export async function measureOurs(
  count: number,
  wire: (fetch: Fetch) => Fetch,
  waits: boolean,
): Promise<Measured> {
  const template = await templateMill();
  const server = await FaultServer.start(template);
  try {
    const database = new LocalDatabase(new IDBFactory() as unknown as globalThis.IDBFactory);
    const outbox = new OneAtATime(database);
    const time = new VirtualTime(TEST_NOW);
    const id = tabletId(0);
    const stamp = {
      shedId: 'north',
      by: 'wanda',
      grantId: grantOf('wanda', id),
      deviceId: id,
      now: TEST_NOW,
      clock: undefined,
      newId,
      steppedSince: () => false,
    };
    await outbox.append(
      Array.from({ length: count }, (_, n) => {
        // As they fall in a shed: over its looms and two days of shifts.
        const at = TEST_NOW - (n % 46) * 3_600_000;
        const loomId = `n${(n % 4) + 1}`;
        return stampDraft({ kind: 'stop', loomId, cause: 'warp-break', count: 1, at }, stamp);
      }),
    );
    const token = await tokenOf(server.url, id);
    let requests = 0;
    const lossy = wire((input, init) => globalThis.fetch(input, init));
    const fetch: Fetch = (input, init) => {
      requests++;
      return lossy(input, init);
    };
    const loop = new SyncLoop({
      api: {
        push: (body) =>
          exchange(fetch, {
            method: 'POST',
            url: `${server.url}/api/sync/entries`,
            body,
            token,
            answer: pushResponseSchema,
          }),
        pull: (after, seen) =>
          exchange(fetch, {
            method: 'GET',
            url: `${server.url}/api/sync/changes?${pullQuery(after, seen)}`,
            token,
            answer: pullResponseSchema,
          }),
      },
      outbox,
      book: new BookStore(database),
      clock: time,
      timers: REAL_TIMERS,
      random: Math.random,
      leads: () => true,
    });
    const began = performance.now();
    if (waits) {
      const done = firstValueFrom(
        loop.status$.pipe(filter((status) => status.phase === 'resting' && status.reach === 'reached')),
      );
      loop.start();
      await done;
      await loop.stop();
    } else while ((await loop.exchangeOnce()) !== null);
    const seconds = (performance.now() - began) / 1_000;
    const [row] = await server.deps.reads.query<{ n: number }[]>(`SELECT count(*) AS "n" FROM "entry"`);
    return { requests, seconds, stored: row?.n ?? 0 };
  } finally {
    await server.close();
    rmSync(template, { recursive: true, force: true });
  }
}

async function tokenOf(url: string, id: string): Promise<string> {
  const response = await globalThis.fetch(`${url}/api/sessions/refresh`, {
    method: 'POST',
    headers: {
      'content-type': 'application/json',
      origin: 'http://shedbeat.test',
      cookie: `shedbeat-device=${id}.${SECRET}`,
    },
    body: '{}',
  });
  return ((await response.json()) as { accessToken: string }).accessToken;
}
