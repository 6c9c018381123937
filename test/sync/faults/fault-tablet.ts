import { pullResponseSchema, pushResponseSchema } from '@shared/contract/sync';
import { sessionSchema } from '@shared/contract/session';
import type { Entry } from '@shared/entries/entry';
import type { Answer } from '../../../src/app/core/answer';
import { ClockWatch, type ClockMeasure } from '../../../src/app/core/clock-watch';
import { exchange, type ExchangeRequest } from '../../../src/app/core/exchange';
import { newId } from '../../../src/app/core/ids';
import type { BookStore } from '../../../src/app/offline/book-store';
import { stampDraft, type EntryDraft } from '../../../src/app/offline/entry-draft';
import { LocalDatabase } from '../../../src/app/offline/local-database';
import { NotSaved } from '../../../src/app/offline/not-saved';
import { Outbox } from '../../../src/app/offline/outbox';
import { SyncLoop } from '../../../src/app/offline/sync-loop';
import type { SyncApi, Timers } from '../../../src/app/offline/sync-ports';
import { quotaExceeded, WatchedFactory } from '../../../src/app/testing/watched-factory';
import type * as z from 'zod/mini';
import { seeded } from '../faulty-wire';
import { TEST_ORIGIN } from '../../../api/testing/test-server.js';
import { pullQuery } from '../simulated-tablet';
import { FaultWire } from './fault-wire';
import type { WireFault } from './plan';
import type { Sabotage } from './sabotage';
import { grantOf, SECRET } from './template-mill';

const NO_TIMERS: Timers = { wait: () => Promise.resolve() };

export interface TabletParts {
  readonly id: string;
  readonly faults: readonly (WireFault | null)[];
  readonly url: () => string;
  /** The true time. */
  readonly now: () => number;
  readonly clockError: number;
  readonly sabotage: Sabotage;
}

/** One open tab: the application's own outbox, book and sync loop over the tablet's storage. */
class Tab {
  readonly database: LocalDatabase;
  readonly outbox: Outbox;
  readonly book: BookStore;
  readonly loop: SyncLoop;

  constructor(tablet: FaultTablet, factory: IDBFactory, api: SyncApi, sabotage: Sabotage) {
    this.database = new LocalDatabase(factory);
    this.outbox = new Outbox(this.database);
    this.book = sabotage.book(this.database);
    this.loop = new SyncLoop({
      api,
      outbox: this.outbox,
      book: this.book,
      clock: {
        now: () => tablet.clock.now(),
        exchanged: (...at): ClockMeasure => tablet.clock.exchanged(...at),
      },
      timers: NO_TIMERS,
      random: seeded(7),
      leads: () => true,
      appVersion: 'simulated',
    });
  }
}

/** A tablet with everything that can happen to it; what it showed as saved is kept outside of it. */
export class FaultTablet {
  readonly wire: FaultWire;
  /** Its own clock, right or wrong, and whether it was asleep. */
  clock: ClockWatch;
  /** What somebody saw as saved. */
  readonly shown: Entry[] = [];
  struck = 0;
  private error: number;
  private slept = 0;
  private token: string | null = null;
  private killed = false;
  private readonly storage = new WatchedFactory();
  private tab: Tab;

  constructor(private readonly parts: TabletParts) {
    this.error = parts.clockError;
    this.wire = new FaultWire({
      faults: parts.faults,
      headers: { cookie: `shedbeat-device=${parts.id}.${SECRET}`, origin: TEST_ORIGIN },
      killTab: () => this.kill(),
    });
    this.clock = this.newClock();
    this.tab = this.open();
  }

  get id(): string {
    return this.parts.id;
  }

  get book(): BookStore {
    return this.tab.book;
  }

  get outbox(): Outbox {
    return this.tab.outbox;
  }

  now(): number {
    return this.parts.now() + this.error;
  }

  /** Somebody sets the clock. */
  jump(ms: number): void {
    this.error += ms;
  }

  sleep(ms: number): void {
    this.slept += ms;
  }

  closeConnections(): void {
    this.storage.closeConnections();
  }

  /** The next put fails so. */
  harmNextPut(how: 'quota' | 'killed', store: string, after = 0): void {
    let puts = 0;
    this.storage.beforePut = (name) => {
      if (name !== store || puts++ < after) return;
      if (how === 'quota') {
        this.storage.beforePut = () => undefined;
        throw quotaExceeded();
      }
      this.kill();
      throw new Error('This tab was killed.');
    };
  }

  /** From here on nothing of this tab reaches the disk. */
  kill(): void {
    this.killed = true;
    this.storage.beforePut = () => {
      throw new Error('This tab was killed.');
    };
  }

  /** Whoever was killed is opened anew on what lies on the disk. */
  async reopen(): Promise<void> {
    if (!this.killed) return;
    this.killed = false;
    this.token = null;
    this.storage.beforePut = () => undefined;
    await this.tab.database.close();
    this.clock = this.newClock();
    this.tab = this.open();
    const measure = await this.tab.book.clockMeasure();
    if (measure) this.clock.restore(measure);
  }

  /** One act of a person, as a screen does it. What does not throw was shown as saved. */
  async log(by: string, draft: EntryDraft, tab: Tab = this.tab): Promise<Entry | null> {
    const { measure } = this.clock;
    const entry = stampDraft(draft, {
      shedId: 'north',
      by,
      grantId: grantOf(by, this.id),
      deviceId: this.id,
      now: this.clock.now(),
      clock: measure ? { offset: measure.offset, measuredAt: measure.measuredAt } : undefined,
      newId,
      steppedSince: (at) => this.clock.steppedSince(at),
    });
    try {
      const [record] = await tab.outbox.append([entry]);
      if (!record) throw new Error('Nothing was stored, and nothing thrown.');
      this.shown.push(record.entry);
      return record.entry;
    } catch (error) {
      if (!(error instanceof NotSaved)) throw error;
      return null;
    }
  }

  secondTab(): Tab {
    return this.open();
  }

  /** Exchanges as the loop does; whatever fails is tried again later. Whether it went well. */
  async exchange(tab: Tab = this.tab): Promise<boolean> {
    try {
      return (await tab.loop.exchangeOnce()) === null;
    } catch {
      return false;
    }
  }

  /** Entries that wait, of whatever the server has not said its word on. */
  async waiting(): Promise<number> {
    return this.tab.outbox.countWaiting();
  }

  private open(): Tab {
    return new Tab(this, this.storage.factory, this.api(), this.parts.sabotage);
  }

  private newClock(): ClockWatch {
    const start = this.parts.now();
    const slept = this.slept;
    return new ClockWatch({
      now: () => this.now(),
      monotonic: () => this.parts.now() - start - (this.slept - slept),
    });
  }

  private api(): SyncApi {
    const at = (path: string) => `${this.parts.url()}/api${path}`;
    return {
      push: (body) =>
        this.send({ method: 'POST', url: at('/sync/entries'), body, answer: pushResponseSchema }),
      pull: (after, seen) =>
        this.send({
          method: 'GET',
          url: at(`/sync/changes?${pullQuery(after, seen)}`),
          answer: pullResponseSchema,
        }),
    };
  }

  /** As the application's client: a 401 renews the token once and asks again. */
  private async send<S extends z.ZodMiniType>(request: ExchangeRequest<S>): Promise<Answer<z.infer<S>>> {
    const first = await exchange(this.wire.fetch, { ...request, token: this.token });
    if (first.kind !== 'problem' || first.status !== 401) return first;
    if (!(await this.renew())) return first;
    return exchange(this.wire.fetch, { ...request, token: this.token });
  }

  private async renew(): Promise<boolean> {
    const url = `${this.parts.url()}/api/sessions/refresh`;
    const answer = await exchange(this.wire.fetch, { method: 'POST', url, body: {}, answer: sessionSchema });
    if (answer.kind !== 'ok') return false;
    this.token = answer.body.accessToken;
    return this.token !== null;
  }
}
