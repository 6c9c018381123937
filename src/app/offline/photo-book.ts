import { Injectable, inject } from '@angular/core';
import { photoSchema } from '@shared/contract/calls';
import { LIMITS } from '@shared/contract/limits';
import { ApiClient, withQuery } from '../core/api-client';
import { Clock } from '../core/clock';
import { newId } from '../core/ids';
import { SessionStore } from '../core/session-store';
import { notSaved } from './not-saved';
import { OfflineParts } from './offline-parts';
import { PhotoStore } from './photo-store';
import { PhotoSync } from './photo-sync';
import { REAL_TIMERS } from './sync-ports';

/** A photo that belongs to what is being written. */
export interface HeldPhoto {
  readonly id: string;
  readonly blob: Blob;
}

/**
 * Photos for screens: kept on this device until the book has them. Loaded by whoever takes one, and by `OfflineParts`
 * where some lie here from before.
 */
@Injectable({ providedIn: 'root' })
export class PhotoBook {
  private readonly parts = inject(OfflineParts);
  private readonly api = inject(ApiClient);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly store = new PhotoStore(this.parts.database);
  private readonly sync = new PhotoSync({
    store: this.store,
    upload: (photo) =>
      this.api.post(
        withQuery(`/api/photos/${photo.id}`, { repairId: photo.repairId }),
        photoSchema,
        new Blob([photo.bytes], { type: photo.type }),
        { bypass: true, timeout: 120_000 },
      ),
    leads: () => this.session.device() !== null && this.parts.lead.leads(),
    isInBook: (repairId) => {
      const state = this.parts.view.stateOf(repairId);
      return this.parts.view.entry(repairId) !== null && (state === 'stored' || state === 'held');
    },
    timers: REAL_TIMERS,
    random: Math.random,
    changed: () => void this.count(),
  });
  private started = false;

  /** Begins to send, and goes on for as long as the page is open. */
  async start(): Promise<void> {
    if (this.started) return;
    this.started = true;
    this.parts.listen((event) => {
      if (event.kind !== 'status') this.sync.nudge();
    });
    globalThis.addEventListener('online', () => this.sync.insist());
    this.parts.onInsist(() => this.sync.insist());
    await this.store.prune(this.clock.now() - LIMITS.resendWindow).catch(() => undefined);
    await this.count();
    this.sync.start();
  }

  /** Durable when it resolves; throws `NotSaved`. */
  async keep(repairId: string, blob: Blob): Promise<HeldPhoto> {
    const id = newId();
    try {
      const bytes = await blob.arrayBuffer();
      await this.store.add({ id, repairId, bytes, type: blob.type, takenAt: this.clock.now() });
    } catch (error) {
      throw notSaved(error);
    }
    return { id, blob };
  }

  /** Those of a repair that is being written, e.g. after a reload. */
  async heldOf(repairId: string): Promise<HeldPhoto[]> {
    const photos = await this.store.ofRepair(repairId).catch(() => []);
    return photos
      .filter(({ logged }) => !logged)
      .map(({ id, bytes, type }) => ({ id, blob: new Blob([bytes], { type }) }));
  }

  /** A photo on this device that the book has not got, to be shown; null: it is not here. */
  async waitingBlob(id: string): Promise<Blob | null> {
    const photo = (await this.store.all().catch(() => [])).find((one) => one.id === id);
    return photo ? new Blob([photo.bytes], { type: photo.type }) : null;
  }

  async drop(id: string): Promise<void> {
    await this.store.drop([id]);
    await this.count();
  }

  /** Logs the repair that names the photos: they wait to be sent from then on, or, where that fails, stay with it. */
  async withRepair<T>(ids: readonly string[], log: () => Promise<T>): Promise<T> {
    if (ids.length === 0) return log();
    await this.store.markLogged(ids, true).catch((error: unknown) => {
      throw notSaved(error);
    });
    try {
      return await log();
    } catch (error) {
      await this.store.markLogged(ids, false).catch(() => undefined);
      throw error;
    } finally {
      await this.count();
      await this.start();
      this.sync.nudge();
    }
  }

  private async count(): Promise<void> {
    const logged = (await this.store.all().catch(() => [])).filter((photo) => photo.logged);
    const refused = logged.filter(({ code }) => code !== null);
    this.parts.photos.set({
      waiting: logged.length - refused.length,
      refused: refused.map(({ id, code }) => ({ id, code: code ?? 'photo-other' })),
    });
  }
}
