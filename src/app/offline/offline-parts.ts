import { DestroyRef, Injectable, Injector, effect, inject, signal, untracked } from '@angular/core';
import { LIMITS } from '@shared/contract/limits';
import { pullResponseSchema, pushResponseSchema } from '@shared/contract/sync';
import { EMPTY, type Subscription, catchError, from, switchMap } from 'rxjs';
import { AccessToken } from '../core/access-token';
import { afterPaint } from '../core/after-paint';
import { ApiClient, withQuery } from '../core/api-client';
import { API } from '../core/api-paths';
import { APP_VERSION } from '../core/app-version';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import type { BookEvent } from './book-events';
import { BookStore } from './book-store';
import { BookView, type Touched } from './book-view';
import type { Unnumbered } from './entry-draft';
import { exportFile } from './export-file';
import { NO_FEED, type FeedState } from './live-state';
import { LocalDatabase, result } from './local-database';
import { notSaved } from './not-saved';
import { Outbox } from './outbox';
import { OutboxCopy } from './outbox-copy';
import { NO_PHOTOS, type PhotosWaiting } from './photos-waiting';
import type { OutboxRecord } from './records';
import { SyncLoop } from './sync-loop';
import { REAL_TIMERS, type SyncApi } from './sync-ports';
import { TabLead } from './tab-lead';

/** Whether the browser has promised to keep this storage. */
async function persisted(): Promise<boolean | undefined> {
  try {
    return await navigator.storage.persisted();
  } catch {
    return undefined;
  }
}

const CHANNEL = 'shedbeat-book';
/** Pulled entries older than this are dropped from the device. */
const KEPT = 40 * 86_400_000;
/** So long no more is logged before what was logged is sent, ms; and so long it waits for that at most. */
const PAUSE = 300;
const LONGEST_UNSENT = 2_000;
type Listener = (event: BookEvent, touched: Touched) => void;
/** `beat`: the leader lives. `logged`: there is something to send. `insist`: a person wants it now. */
type Message =
  | { readonly kind: 'beat' }
  | { readonly kind: 'logged' }
  | { readonly kind: 'insist' }
  | { readonly kind: 'feed'; readonly state: FeedState }
  | BookEvent;

/** Puts a browser's real parts together: storage, view, loop, feed, tabs. `OfflineBook` is its face for screens. */
@Injectable({ providedIn: 'root' })
export class OfflineParts {
  private readonly api = inject(ApiClient);
  private readonly token = inject(AccessToken);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly injector = inject(Injector);
  private readonly listeners = new Set<Listener>();
  private readonly insisting = new Set<() => void>();
  private readonly tabs = typeof BroadcastChannel === 'function' ? new BroadcastChannel(CHANNEL) : null;
  private readonly early: BookEvent[] = [];
  private started: Promise<void> | null = null;
  private loaded = false;
  private readonly leading = signal(false);
  private feed: Subscription | null = null;
  private sending: ReturnType<typeof setTimeout> | undefined;
  private unsentSince: number | null = null;

  private readonly feedNow = signal<FeedState>(NO_FEED);

  /** How the leading tab's live feed stands. */
  readonly feedState = this.feedNow.asReadonly();
  /** Photos that the book has not got; told by `PhotoBook`. */
  readonly photos = signal<PhotosWaiting>(NO_PHOTOS);
  /** The shed that somebody at an office browser chose to see; a tablet's is its own. */
  readonly shed = signal<string | null>(null);
  readonly database = new LocalDatabase(globalThis.indexedDB);
  readonly outbox = new Outbox(this.database);
  readonly book = new BookStore(this.database);
  private readonly copy = new OutboxCopy();
  readonly view = new BookView(() => this.clock.offset());
  readonly lead = new TabLead({
    locks: globalThis.navigator?.locks,
    now: () => performance.now(),
    beat: () => {
      this.tabs?.postMessage({ kind: 'beat' } satisfies Message);
      // A tab that was opened since does not know it.
      this.tabs?.postMessage({ kind: 'feed', state: this.feedNow() } satisfies Message);
    },
  });
  readonly loop = new SyncLoop({
    api: this.syncApi(),
    outbox: this.outbox,
    book: this.book,
    clock: this.clock,
    timers: REAL_TIMERS,
    random: Math.random,
    // A browser that nobody has signed in on has nothing to ask and nobody to ask it as.
    leads: () => this.session.device() !== null && this.lead.leads(),
    appVersion: APP_VERSION,
    persisted,
  });

  constructor() {
    const events = this.loop.events$.subscribe((event) => {
      this.tell(event);
      this.hear(event);
      if (event.kind === 'outbox') void this.keepCopiesOf(event.records);
    });
    this.tabs?.addEventListener('message', ({ data }: MessageEvent<Message>) => this.hearTab(data));
    const online = (): void => this.loop.networkBack();
    const shown = (): void => {
      if (document.visibilityState === 'visible') this.loop.networkBack();
    };
    globalThis.addEventListener('online', online);
    document.addEventListener('visibilitychange', shown);
    this.lead.onLead(() => this.leading.set(true));
    // A new sign-in, another device or another shed may be what the server was waiting for.
    effect(() => {
      this.session.state();
      const device = this.session.device();
      this.shed();
      const live = this.leading() && device !== null && !device.revoked;
      untracked(() => {
        this.loop.insist();
        this.openFeed(live);
      });
    });
    inject(DestroyRef).onDestroy(() => {
      globalThis.removeEventListener('online', online);
      document.removeEventListener('visibilitychange', shown);
      clearTimeout(this.sending);
      events.unsubscribe();
      this.feed?.unsubscribe();
      this.lead.stop();
      void this.loop.stop().then(() => this.database.close());
      this.tabs?.close();
    });
  }

  /** Reads what lies on this device and begins to sync. Throws `NotSaved` where the device's storage fails. */
  start(): Promise<void> {
    this.started ??= this.begin().catch((error: unknown) => {
      this.started = null;
      throw notSaved(error);
    });
    return this.started;
  }

  /** Durable when it resolves; throws `NotSaved`. */
  async append(entries: readonly Unnumbered[]): Promise<OutboxRecord[]> {
    await this.start();
    const records = await this.outbox.append(entries);
    // On disk: it counts at once. Only with its second copy is it told as saved.
    this.clock.moveOn();
    this.changed(records, []);
    // A second copy and the sending take time on a slow tablet: not before the count is seen.
    await afterPaint();
    await this.copy.keep(records);
    this.sendSoon();
    return records;
  }

  /** A person wants it now, in whichever tab. */
  insist(): void {
    this.insistHere();
    this.tabs?.postMessage({ kind: 'insist' } satisfies Message);
  }

  async exportOutbox(): Promise<Blob> {
    const records = await this.outbox.all();
    const blob = exportFile(records, this.clock.now());
    const ids = records.map((record) => record.entry.id);
    this.changed(await this.outbox.markExported(ids, this.clock.now()), []);
    return blob;
  }

  async dismiss(id: string): Promise<boolean> {
    const gone = await this.outbox.dismiss(id);
    if (gone) {
      this.changed([], [id]);
      void this.copy.drop([id]);
    }
    return gone;
  }

  /** Hears when a person wants it now. */
  onInsist(listener: () => void): () => void {
    this.insisting.add(listener);
    return () => this.insisting.delete(listener);
  }

  listen(listener: Listener): () => void {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  }

  private async begin(): Promise<void> {
    await this.copy.recoverInto(this.database);
    const measure = await this.book.clockMeasure();
    if (measure) this.clock.restore(measure);
    const now = this.clock.now();
    await this.outbox.prune(now - LIMITS.resendWindow);
    await this.book.prune(now - KEPT);
    const waiting = await this.outbox.all();
    const sent = await this.outbox.sentSince(now - 86_400_000);
    const contents = await this.book.load();
    this.view.load(contents, [...sent, ...waiting]);
    this.loop.status$.next({ ...this.loop.status$.value, lastReachedAt: await this.book.lastReached() });
    this.loaded = true;
    for (const event of this.early.splice(0)) this.hear(event);
    this.lead.start();
    this.loop.start();
    if (!globalThis.navigator?.locks) this.leading.set(true);
    void this.askToPersist();
    void this.wakePhotos();
  }

  /** In the first pause: an exchange writes on the same disk, and a hand that taps on must not wait for it. */
  private sendSoon(): void {
    const now = performance.now();
    this.unsentSince ??= now;
    clearTimeout(this.sending);
    this.sending = setTimeout(
      () => {
        this.unsentSince = null;
        this.tabs?.postMessage({ kind: 'logged' } satisfies Message);
        this.loop.nudge();
      },
      Math.max(0, Math.min(PAUSE, this.unsentSince + LONGEST_UNSENT - now)),
    );
  }

  private insistHere(): void {
    this.loop.insist();
    for (const listener of this.insisting) listener();
  }

  /** What sends photos is loaded only where some wait here: most tablets never take one. */
  private async wakePhotos(): Promise<void> {
    try {
      const count = await this.database.transact(['photos'], 'readonly', (transaction) =>
        result(transaction.objectStore('photos').count()),
      );
      if (count === 0) return;
      const { PhotoBook } = await import('./photo-book');
      await this.injector.get(PhotoBook).start();
    } catch {
      // They lie here still; the next start sends them.
    }
  }

  /** What the book has needs no copy; what waits again (another book) does. */
  private async keepCopiesOf(records: readonly OutboxRecord[]): Promise<void> {
    const inBook = records.filter(({ state }) => state === 'stored' || state === 'held');
    await this.copy.drop(inBook.map(({ entry }) => entry.id));
    await this.copy.keep(records.filter(({ state }) => state === 'waiting'));
  }

  private openFeed(live: boolean): void {
    this.feed?.unsubscribe();
    this.feed = null;
    if (!live) return;
    // Loaded when there is somebody to listen for; were it missing, news would come with the next pull.
    const news = from(import('./live-feed')).pipe(
      switchMap(({ liveFeed }) =>
        liveFeed({
          fetch: (input, init) => globalThis.fetch(input, init),
          url: withQuery(API.live, { shedId: this.shed() ?? undefined }),
          token: () => this.token.value,
          renew: () => this.token.renew(),
          random: Math.random,
          opened: () => this.loop.nudge(),
          heard: () => this.feedIs({ open: true, heardAt: this.clock.now() }),
          lost: () => this.feedIs({ open: false }),
        }),
      ),
      catchError(() => EMPTY),
    );
    this.feed = news.subscribe(() => {
      this.feedIs({ newsAt: this.clock.now() });
      this.loop.nudge();
    });
  }

  private feedIs(change: Partial<FeedState>): void {
    const state = { ...this.feedNow(), ...change };
    this.feedNow.set(state);
    this.tabs?.postMessage({ kind: 'feed', state } satisfies Message);
  }

  private changed(records: readonly OutboxRecord[], dismissed: readonly string[]): void {
    const event: BookEvent = { kind: 'outbox', records, dismissed };
    this.tell(event);
    this.hear(event);
  }

  private tell(event: BookEvent): void {
    this.tabs?.postMessage(event satisfies Message);
  }

  private hearTab(message: Message): void {
    if (message.kind === 'beat') return this.lead.heard();
    if (message.kind === 'logged') return this.loop.nudge();
    if (message.kind === 'insist') return this.insistHere();
    if (message.kind === 'feed') {
      if (!this.lead.leads()) this.feedNow.set(message.state);
      return;
    }
    if (message.kind === 'status') {
      if (!this.lead.leads()) this.loop.status$.next(message.status);
      return;
    }
    this.hear(message);
  }

  private hear(event: BookEvent): void {
    if (!this.loaded) {
      this.early.push(event);
      return;
    }
    const touched = this.view.apply(event);
    for (const listener of this.listeners) listener(event, touched);
  }

  private syncApi(): SyncApi {
    const options = { bypass: true, timeout: 60_000 };
    return {
      push: (request) => this.api.post(API.push, pushResponseSchema, request, options),
      pull: (after, seen) => {
        const query = {
          after: after ?? undefined,
          seen: seen ?? undefined,
          shedId: this.shed() ?? undefined,
        };
        return this.api.get(API.pull, pullResponseSchema, query, options);
      },
    };
  }

  /** Asks once that the browser does not clear this storage when space runs short: some ask the person in turn. */
  private async askToPersist(): Promise<void> {
    try {
      if ((await navigator.storage.persisted()) || (await this.book.hasAskedToPersist())) return;
      await this.book.rememberAskedToPersist();
      await navigator.storage.persist();
    } catch {
      // A browser that cannot promise it still keeps what it keeps.
    }
  }
}
