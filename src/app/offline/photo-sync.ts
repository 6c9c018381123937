import type { ErrorCode } from '@shared/contract/errors';
import type { Answer } from '../core/answer';
import { backOff, type Trouble } from './back-off';
import type { PhotoRecord, PhotoStore } from './photo-store';
import type { Timers } from './sync-ports';

export interface PhotoPorts {
  readonly store: PhotoStore;
  readonly upload: (photo: PhotoRecord) => Promise<Answer<unknown>>;
  /** Whether this tab talks to the server, and somebody or a tablet to talk as. */
  readonly leads: () => boolean;
  /** Whether the book has the repair: before that its photos need not be tried. */
  readonly isInBook: (repairId: string) => boolean;
  readonly timers: Timers;
  readonly random: () => number;
  /** Something was sent or refused. */
  readonly changed: () => void;
}

/** The picture itself is wrong: sending it again would not help. All else is tried again. */
const FOR_GOOD: ReadonlySet<ErrorCode> = new Set(['photo-not-an-image', 'photo-too-large', 'photo-other']);
/** How often what waits is looked at when nothing happens, ms. */
const IDLE = 60_000;

/**
 * Sends photos after their repairs, one at a time, oldest first; a photo leaves the device only when the server has
 * said that it keeps it. Broken off anywhere, it is done again: the same photo sent twice is the same photo.
 */
export class PhotoSync {
  private ending: AbortController | null = null;
  private waking = new AbortController();
  private failures = 0;

  constructor(private readonly ports: PhotoPorts) {}

  start(): void {
    if (this.ending) return;
    this.ending = new AbortController();
    void this.run(this.ending.signal);
  }

  stop(): void {
    this.ending?.abort();
    this.waking.abort();
    this.ending = null;
  }

  /** There may be something to send. Does not shorten a back-off. */
  nudge(): void {
    if (this.failures === 0) this.waking.abort();
  }

  /** The network is back, or a person wants it now. */
  insist(): void {
    this.failures = 0;
    this.waking.abort();
  }

  private async run(ended: AbortSignal): Promise<void> {
    while (!ended.aborted) {
      this.waking = new AbortController();
      const trouble = await this.pass().catch((): Trouble => ({ why: 'busy', retryAfter: null }));
      this.failures = trouble ? this.failures + 1 : 0;
      const wait = trouble ? backOff(this.failures, trouble, this.ports.random()) : IDLE;
      await this.ports.timers.wait(wait, AbortSignal.any([ended, this.waking.signal]));
    }
  }

  /** Sends what can be sent; what stood in the way, or null. */
  async pass(): Promise<Trouble | null> {
    if (!this.ports.leads()) return null;
    for (const photo of await this.ports.store.all()) {
      if (!photo.logged || photo.code !== null || !this.ports.isInBook(photo.repairId)) continue;
      const answer = await this.ports.upload(photo);
      if (answer.kind === 'offline') return { why: 'offline', retryAfter: null };
      if (answer.kind === 'ok') await this.ports.store.drop([photo.id]);
      else if (FOR_GOOD.has(answer.code)) await this.ports.store.refuse(photo.id, answer.code);
      else return { why: answer.status >= 500 ? 'busy' : 'refused', retryAfter: answer.retryAfter };
      this.ports.changed();
    }
    return null;
  }
}
