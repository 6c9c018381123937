import { Injectable, computed, inject, signal } from '@angular/core';
import { changedSchema, setUpSchema, type Changed, type SetUp } from '@shared/contract/set-up';
import type { ReportLoad } from '../../../core/report-load';
import { loadOf } from '../../../core/report-load';
import type { Answer } from '../../../core/answer';
import { ApiClient } from '../../../core/api-client';
import type { Units } from './quantity';

const EMPTY: ReportLoad<SetUp> = { state: 'loading', value: null, sentence: '' };

const NOTHING: SetUp = {
  mill: { name: '', timeZone: 'UTC', units: 'metric' },
  sheds: [],
  looms: [],
  loomVersions: [],
  alleys: [],
  cloths: [],
  clothVersions: [],
  beams: [],
  causeVersions: [],
  targets: [],
  parts: [],
  jobs: [],
  patterns: [],
  calendar: [],
  shifts: [],
};

/** All that set-up shows of the mill, one document, and the way to change it. Lives as long as set-up is open. */
@Injectable()
export class SetUpStore {
  private readonly api = inject(ApiClient);
  private readonly loaded = signal(EMPTY);
  private asked = 0;

  readonly load = this.loaded.asReadonly();
  /** Null: not fetched yet, or not to be had. */
  readonly setUp = computed(() => this.loaded().value);
  /** The same for pages inside set-up's frame, which shows them only once it is there. */
  readonly known = computed<SetUp>(() => this.setUp() ?? NOTHING);
  readonly mill = computed(() => this.setUp()?.mill ?? null);
  readonly units = computed<Units>(() => this.mill()?.units ?? 'metric');
  /** The mill's time zone; while it is not known, the device's own. */
  readonly timeZone = computed(
    () => this.mill()?.timeZone ?? Intl.DateTimeFormat().resolvedOptions().timeZone,
  );

  constructor() {
    void this.reload();
  }

  /** Fetches the document anew; what stands on the page stays there meanwhile. */
  async reload(): Promise<void> {
    const turn = ++this.asked;
    const answer = await this.api.get('/api/set-up', setUpSchema);
    // Two changes shortly one after the other: the older answer does not put back what the newer shows.
    if (turn === this.asked) this.loaded.update((before) => loadOf(answer, before.value));
  }

  /** Changes something below `/api/set-up` and fetches the document anew. */
  async change(method: 'POST' | 'PATCH' | 'DELETE', path: string, body?: unknown): Promise<Answer<Changed>> {
    const answer = await this.api.send({
      method,
      url: `/api/set-up${path}`,
      answer: changedSchema,
      ...(body === undefined ? {} : { body }),
    });
    if (answer.kind === 'ok') await this.reload();
    return answer;
  }
}
