import { IDBFactory } from 'fake-indexeddb';
import { pullResponseSchema, pushResponseSchema } from '@shared/contract/sync';
import type { Grant } from '@shared/contract/session';
import { exchange, type Fetch } from '../../src/app/core/exchange';
import { newId } from '../../src/app/core/ids';
import { BookStore } from '../../src/app/offline/book-store';
import { BookView } from '../../src/app/offline/book-view';
import { stampDraft, type EntryDraft } from '../../src/app/offline/entry-draft';
import { LocalDatabase } from '../../src/app/offline/local-database';
import { Outbox } from '../../src/app/offline/outbox';
import type { OutboxRecord } from '../../src/app/offline/records';
import { SyncLoop } from '../../src/app/offline/sync-loop';
import type { SyncApi } from '../../src/app/offline/sync-ports';
import { VirtualTime } from '../../src/app/testing/virtual-time';

export interface TabletParts {
  readonly grant: Grant;
  readonly shedId: string;
  readonly authorization: string;
  readonly fetch: Fetch;
  /** Where the server is; may move. */
  readonly url: () => string;
  /** The tablet's own clock at the start, right or wrong. */
  readonly now: number;
  readonly random: () => number;
}

/**
 * A tablet without a screen: the application's own outbox, book, sync loop and projection over an in-memory
 * IndexedDB, its own (possibly wrong) virtual clock, and real HTTP. What it does not have: a browser's tabs, service
 * worker and cookies.
 */
export class SimulatedTablet {
  readonly time: VirtualTime;
  readonly outbox: Outbox;
  readonly book: BookStore;
  readonly loop: SyncLoop;
  readonly database = new LocalDatabase(new IDBFactory() as unknown as globalThis.IDBFactory);

  constructor(private readonly parts: TabletParts) {
    this.time = new VirtualTime(parts.now);
    this.outbox = new Outbox(this.database);
    this.book = new BookStore(this.database);
    this.loop = new SyncLoop({
      api: this.api(),
      outbox: this.outbox,
      book: this.book,
      clock: this.time,
      timers: this.time,
      random: parts.random,
      leads: () => true,
    });
  }

  /** Logs one act, as a screen does. */
  async log(...drafts: EntryDraft[]): Promise<OutboxRecord[]> {
    const { grant, shedId } = this.parts;
    const stamp = {
      shedId,
      by: grant.personId,
      grantId: grant.id,
      deviceId: grant.deviceId,
      now: this.time.now(),
      clock: undefined,
      newId,
      steppedSince: () => false,
      ...(drafts.length > 1 && { batchId: newId() }),
    };
    return this.outbox.append(drafts.map((draft) => stampDraft(draft, stamp)));
  }

  /** Exchanges until one goes well. Says how often it was tried. */
  async syncUntilDone(limit = 500): Promise<number> {
    for (let tries = 1; tries <= limit; tries++) {
      if ((await this.loop.exchangeOnce()) === null) return tries;
      this.time.advance(1_000);
    }
    throw new Error(`Not done after ${limit} tries.`);
  }

  /** The book as a screen on this tablet would see it after a reload. */
  async view(): Promise<BookView> {
    const view = new BookView(() => this.time.offset);
    view.load(await this.book.load(), [...(await this.outbox.sentSince(0)), ...(await this.outbox.all())]);
    return view;
  }

  private api(): SyncApi {
    const { parts } = this;
    const token = parts.authorization.replace(/^Bearer /, '');
    return {
      push: (body) =>
        exchange(parts.fetch, {
          method: 'POST',
          url: `${parts.url()}/api/sync/entries`,
          body,
          token,
          answer: pushResponseSchema,
        }),
      pull: (after, seen) =>
        exchange(parts.fetch, {
          method: 'GET',
          url: `${parts.url()}/api/sync/changes?${pullQuery(after, seen)}`,
          token,
          answer: pullResponseSchema,
        }),
    };
  }
}

/** What a pull says of where it got to. */
export function pullQuery(after: string | null, seen: string | null): string {
  return new URLSearchParams({ ...(after !== null && { after }), ...(seen !== null && { seen }) }).toString();
}
