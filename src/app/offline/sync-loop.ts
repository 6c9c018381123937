import { LIMITS } from '@shared/contract/limits';
import type { ErrorCode } from '@shared/contract/errors';
import type { PulledEntry } from '@shared/contract/sync';
import type { Entry } from '@shared/entries/entry';
import { BehaviorSubject, Subject } from 'rxjs';
import type { Answer } from '../core/answer';
import { backOff, type Trouble } from './back-off';
import { NOT_YET, type BookEvent, type SyncStatus } from './book-events';
import { idOf } from './book-store';
import type { OutboxRecord } from './records';
import type { SyncPorts } from './sync-ports';

/** Without a live feed the book is asked this often. */
const POLL = 30_000;
/** A tab that does not lead looks this often whether it should. */
const FOLLOW = 5_000;
/** Entries that the server was too old for are tried again this often. */
const LATER = 15 * 60_000;

type Failure = Trouble & { readonly code: ErrorCode | null };
/** `changed`: the records on which the server said its word. `again`: those that it asked for once more. */
type Pushed =
  | {
      readonly kind: 'ok';
      readonly changed: readonly OutboxRecord[];
      readonly again: readonly OutboxRecord[];
    }
  | Exclude<Answer<unknown>, { kind: 'ok' }>;

/**
 * Push, then pull, then rest; after trouble, back off. It runs wherever its ports are real: a browser's tab or a
 * simulated tablet.
 *
 * What holds however often it is broken off: an entry leaves the outbox only by the server's own word on it, kept in
 * one transaction; a cursor is stored with its data; so anything may be repeated, and nothing is skipped.
 */
export class SyncLoop {
  readonly status$ = new BehaviorSubject<SyncStatus>(NOT_YET);
  /** What became durable, for views. */
  readonly events$ = new Subject<BookEvent>();
  private running: AbortController | null = null;
  private finished: Promise<void> = Promise.resolve();
  private resting: AbortController | null = null;
  private restIs: 'idle' | 'offline' | 'told-to-wait' = 'idle';
  private wanted = false;
  /** The server's word on something was kept in this try. */
  private gotThrough = false;
  private laterTriedAt: number | null = null;

  constructor(private readonly ports: SyncPorts) {}

  start(): void {
    if (this.running) return;
    this.running = new AbortController();
    this.finished = this.run(this.running.signal);
  }

  /** Resolves when no exchange is under way any more. */
  async stop(): Promise<void> {
    this.running?.abort();
    this.running = null;
    this.resting?.abort();
    await this.finished;
  }

  /** There is something to send or to fetch. Does not cut a back-off short. */
  nudge(): void {
    this.wanted = true;
    if (this.restIs === 'idle') this.resting?.abort();
  }

  /** The network seems to be back: cuts short a wait for the network, not one that the server asked for. */
  networkBack(): void {
    this.wanted = true;
    if (this.restIs !== 'told-to-wait') this.resting?.abort();
  }

  /** A person wants it now. */
  insist(): void {
    this.wanted = true;
    this.resting?.abort();
  }

  /** One whole exchange: everything that waits is pushed, everything new is pulled. Null: it went well. */
  async exchangeOnce(): Promise<Failure | null> {
    for (;;) {
      const pushed = await this.pushAll();
      if (pushed) return pushed;
      const pulled = await this.pullAll();
      if (pulled === 'again') continue;
      // A withdrawn device may only hand in: it learns by an empty push that the book is another one.
      if (pulled?.code === 'device-revoked' && (await this.pushNothing())) continue;
      return pulled;
    }
  }

  private async run(signal: AbortSignal): Promise<void> {
    let failures = 0;
    while (!signal.aborted) {
      if (!this.ports.leads()) {
        await this.rest(FOLLOW, 'idle');
        continue;
      }
      this.wanted = false;
      const failure = await this.tryOnce();
      if (signal.aborted) return;
      if (!failure) {
        failures = 0;
        this.tell({ phase: 'resting', nextTryAt: null });
        await this.rest(POLL, 'idle');
        continue;
      }
      // A network that loses every tenth answer is slow, not gone: what got through counts.
      failures = this.gotThrough ? 1 : failures + 1;
      const wait = backOff(failures, failure, this.ports.random());
      this.tell({
        phase: 'backing-off',
        reach: failure.why === 'offline' ? 'offline' : 'refused',
        code: failure.code,
        nextTryAt: this.ports.clock.now() + wait,
      });
      await this.rest(wait, failure.why === 'offline' ? 'offline' : 'told-to-wait');
    }
  }

  /** Trouble with this device's own storage is trouble like any other: it is tried again. */
  private async tryOnce(): Promise<Failure | null> {
    this.gotThrough = false;
    try {
      return await this.exchangeOnce();
    } catch {
      return { why: 'busy', retryAfter: null, code: null };
    }
  }

  private async rest(ms: number, is: SyncLoop['restIs']): Promise<void> {
    if (!this.running || (this.wanted && is === 'idle' && this.ports.leads())) return;
    this.resting = new AbortController();
    this.restIs = is;
    await this.ports.timers.wait(ms, this.resting.signal);
    this.resting = null;
    this.restIs = 'idle';
  }

  private async pushAll(): Promise<Failure | null> {
    await this.requeueLater();
    let size: number = LIMITS.entriesPerPush;
    for (;;) {
      const batch = await this.ports.outbox.nextBatch(size);
      if (batch.length === 0) return null;
      this.tell({ phase: 'sending' });
      const answer = await this.push(batch);
      if (answer.kind === 'ok') {
        const { changed } = answer;
        // A server that says nothing on any of them must not be asked for ever.
        if (changed.length === 0) {
          this.gotThrough = false;
          return { why: 'busy', retryAfter: null, code: 'internal' };
        }
      } else if (answer.kind === 'problem' && answer.status === 413) size = await this.halve(batch);
      else return failureOf(answer);
    }
  }

  private async push(batch: readonly Entry[]): Promise<Pushed> {
    const sentAt = this.ports.clock.now();
    const seen = await this.ports.book.mark();
    const persisted = await this.ports.persisted?.();
    const answer = await this.ports.api.push({
      sentAt,
      ...(seen !== null && { seen }),
      ...(persisted !== undefined && { persisted }),
      ...(this.ports.appVersion && { appVersion: this.ports.appVersion }),
      waiting: await this.ports.outbox.countWaiting(),
      entries: [...batch],
    });
    if (answer.kind !== 'ok') return answer;
    const { results, serverNow, mark, resend } = answer.body;
    // Before the mark of the other book is stored, as with a pull's cursor.
    const again = resend ? await this.resend() : [];
    const changed = await this.ports.outbox.settle(batch, results, this.ports.clock.now(), mark);
    this.tellOutbox(changed);
    await this.reached(sentAt, serverNow);
    return { kind: 'ok', changed, again };
  }

  /** Says only which book this device last spoke to. Whether something waits again. */
  private async pushNothing(): Promise<boolean> {
    const answer = await this.push([]);
    return answer.kind === 'ok' && answer.again.length > 0;
  }

  /**
   * Too large for the server, or for what stands before it: the next size to try. One entry alone that is too large
   * is refused.
   */
  private async halve(batch: readonly Entry[]): Promise<number> {
    const [only] = batch;
    if (batch.length === 1 && only)
      this.tellOutbox(await this.ports.outbox.refuse(only.id, 'too-large', this.ports.clock.now()));
    return Math.max(1, Math.floor(batch.length / 2));
  }

  private async pullAll(): Promise<Failure | 'again' | null> {
    this.tell({ phase: 'fetching' });
    for (;;) {
      const sentAt = this.ports.clock.now();
      const answer = await this.ports.api.pull(await this.ports.book.cursor(), await this.ports.book.mark());
      if (answer.kind !== 'ok') return failureOf(answer);
      const pull = answer.body;
      // Before the cursor of the new book is stored: a crash between must not lose the wish to send again.
      const again = pull.resend ? await this.resend() : [];
      await this.ports.book.apply(pull);
      this.events$.next({ kind: 'pulled', pull });
      this.tellOutbox(await this.decided(pull.entries));
      await this.reached(sentAt, pull.serverNow);
      if (again.length > 0) return 'again';
      if (!pull.more) return null;
    }
  }

  private async resend(): Promise<OutboxRecord[]> {
    const again = await this.ports.outbox.resend(this.ports.clock.now() - LIMITS.resendWindow);
    this.tellOutbox(again);
    return again;
  }

  /** Of one's own held entries: what the foreman decided meanwhile, or what needs no decision any more. */
  private async decided(entries: readonly PulledEntry[]): Promise<OutboxRecord[]> {
    const free = entries.filter(({ holds }) => holds.every((hold) => hold.state !== 'held'));
    return free.length ? this.ports.outbox.decided(new Set(free.map(idOf)), this.ports.clock.now()) : [];
  }

  private async requeueLater(): Promise<void> {
    const now = this.ports.clock.now();
    if (this.laterTriedAt !== null && Math.abs(now - this.laterTriedAt) < LATER) return;
    this.laterTriedAt = now;
    this.tellOutbox(await this.ports.outbox.requeueLater());
  }

  private async reached(sentAt: number, serverNow: number): Promise<void> {
    this.gotThrough = true;
    const now = this.ports.clock.now();
    const measure = this.ports.clock.exchanged(sentAt, now, serverNow);
    await this.ports.book.reached(serverNow, measure);
    this.tell({ reach: 'reached', code: null, lastReachedAt: serverNow, nextTryAt: null });
  }

  private tell(change: Partial<SyncStatus>): void {
    const status = { ...this.status$.value, ...change };
    this.status$.next(status);
    this.events$.next({ kind: 'status', status });
  }

  private tellOutbox(records: readonly OutboxRecord[]): void {
    if (records.length) this.events$.next({ kind: 'outbox', records, dismissed: [] });
  }
}

function failureOf(answer: Exclude<Answer<unknown>, { kind: 'ok' }>): Failure {
  if (answer.kind === 'offline') return { why: 'offline', retryAfter: null, code: null };
  const busy = answer.status === 429 || answer.status >= 500;
  return { why: busy ? 'busy' : 'refused', retryAfter: answer.retryAfter, code: answer.code };
}
