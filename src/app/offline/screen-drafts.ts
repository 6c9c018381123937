import { Injectable, inject } from '@angular/core';
import { del, get, keys, set } from 'idb-keyval';
import { LIMITS } from '@shared/contract/limits';
import { Clock } from '../core/clock';
import { OfflineParts } from './offline-parts';
import { factOf, isReadable, type Fact } from './records';

const PREFIX = 'draft:';

interface Draft {
  readonly savedAt: number;
  readonly text: unknown;
}

/**
 * What is half typed on a screen, by the screen's name for it: it outlives a reload, and lies on this device alone.
 * A draft that nobody has touched for two weeks is dropped.
 */
@Injectable({ providedIn: 'root' })
export class ScreenDrafts {
  private readonly clock = inject(Clock);
  private readonly facts = inject(OfflineParts).database.store('facts');
  /** One write after the other: the last one typed is the last one kept. */
  private last: Promise<unknown> = Promise.resolve();

  /** What was typed; null: nothing, or a newer application wrote it. Whoever asks checks its shape. */
  async read(name: string): Promise<unknown> {
    await this.dropOld();
    return (await this.draft(PREFIX + name))?.text ?? null;
  }

  /** Resolves when it is on this device's disk. `text` null: nothing is half typed any more. */
  keep(name: string, text: unknown): Promise<void> {
    const done = this.last.then(() =>
      text === null
        ? del(PREFIX + name, this.facts)
        : set(PREFIX + name, factOf<Draft>({ savedAt: this.clock.now(), text }), this.facts),
    );
    this.last = done.catch(() => undefined);
    return done;
  }

  private async dropOld(): Promise<void> {
    for (const key of await keys<string>(this.facts)) {
      if (!key.startsWith(PREFIX)) continue;
      const savedAt = (await this.draft(key))?.savedAt ?? 0;
      if (this.clock.now() - savedAt > LIMITS.resendWindow) await del(key, this.facts);
    }
  }

  private async draft(key: string): Promise<Draft | null> {
    const raw = await get<unknown>(key, this.facts);
    return isReadable(raw) ? (raw as Fact<Draft>).value : null;
  }
}
