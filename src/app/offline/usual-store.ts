import { Injectable, computed, effect, inject, signal, untracked } from '@angular/core';
import { usualSchema, type Usual, type UsualRow } from '@shared/contract/usual';
import { get, set } from 'idb-keyval';
import { ApiClient } from '../core/api-client';
import { Clock } from '../core/clock';
import { BookSignals } from './book-signals';
import { OfflineParts } from './offline-parts';
import { factOf, isReadable, type Fact } from './records';

/** What is usual changes with the weeks: asked for again after so long, ms. */
const FRESH = 12 * 3_600_000;
const KEY = 'usual';

interface KeptUsual {
  readonly usual: Usual;
  /** Device's clock. */
  readonly at: number;
}

/** What the shed's looms usually give with their cloths, kept on this device so that it is there without network. */
@Injectable({ providedIn: 'root' })
export class UsualStore {
  private readonly api = inject(ApiClient);
  private readonly clock = inject(Clock);
  private readonly facts = inject(OfflineParts).database.store('facts');
  private readonly shedId = inject(BookSignals).shedId;
  private readonly kept = signal<KeptUsual | null>(null);
  private readonly loaded = this.load();
  private asking: Promise<void> | null = null;

  private readonly rows = computed<ReadonlyMap<string, UsualRow>>(() => {
    const usual = this.kept()?.usual;
    if (!usual || usual.shedId !== this.shedId()) return new Map();
    return new Map(usual.rows.map((row) => [`${row.loomId} ${row.clothId ?? ''}`, row]));
  });

  constructor() {
    effect(() => {
      if (this.shedId() !== null) untracked(() => void this.renew());
    });
  }

  /** Null: not known here, or the loom has not woven that cloth in the last weeks. */
  rowOf(loomId: string, clothId: string | null): UsualRow | null {
    return this.rows().get(`${loomId} ${clothId ?? ''}`) ?? null;
  }

  /** Asks the server where what is kept is old or another shed's. Without network what is kept goes on. */
  renew(): Promise<void> {
    this.asking ??= this.ask().finally(() => {
      this.asking = null;
    });
    return this.asking;
  }

  private async ask(): Promise<void> {
    await this.loaded;
    const shedId = this.shedId();
    const kept = this.kept();
    const now = this.clock.now();
    if (shedId === null || (kept?.usual.shedId === shedId && now - kept.at < FRESH)) return;
    const answer = await this.api.get('/api/reports/usual', usualSchema, { shedId });
    if (answer.kind !== 'ok') return;
    const next: KeptUsual = { usual: answer.body, at: now };
    this.kept.set(next);
    await set(KEY, factOf(next), this.facts).catch(() => undefined);
  }

  private async load(): Promise<void> {
    try {
      const raw = await get<Fact<KeptUsual>>(KEY, this.facts);
      if (isReadable(raw)) this.kept.set(raw.value);
    } catch {
      // Asked for again.
    }
  }
}
