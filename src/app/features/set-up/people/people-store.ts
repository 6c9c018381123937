import { Injectable, inject, signal } from '@angular/core';
import { pinSlipsSchema } from '@shared/contract/one-time';
import { peopleListSchema, personRowSchema, type PersonRow } from '@shared/contract/session';
import { letterSchema } from '@shared/contract/set-up';
import { ApiClient } from '../../../core/api-client';
import { loadOf, type ReportLoad } from '../../../core/report-load';

const EMPTY: ReportLoad<readonly PersonRow[]> = { state: 'loading', value: null, sentence: '' };
const PATH = '/api/people';

/** Everybody of the mill, and the ways to change them. Kept while set-up's pages about people come and go. */
@Injectable({ providedIn: 'root' })
export class PeopleStore {
  private readonly api = inject(ApiClient);
  private readonly loaded = signal(EMPTY);

  readonly load = this.loaded.asReadonly();
  /** Whose PIN slips are to be made next: chosen in the list, printed on a page of its own. */
  readonly forSlips = signal<ReadonlySet<string>>(new Set());

  async reload(): Promise<void> {
    const answer = await this.api.get(PATH, peopleListSchema);
    const people = answer.kind === 'ok' ? { ...answer, body: answer.body.people } : answer;
    this.loaded.update(({ value }) => loadOf<readonly PersonRow[]>(people, value));
  }

  save(id: string | null, body: object) {
    return id === null
      ? this.api.post(PATH, personRowSchema, body)
      : this.api.patch(`${PATH}/${encodeURIComponent(id)}`, personRowSchema, body);
  }

  /** Sends the letter with a one-time link, and says what became of it. */
  invite(id: string) {
    return this.api.post(`${PATH}/${encodeURIComponent(id)}/invite`, letterSchema, {});
  }

  makeSlips(ids: readonly string[]) {
    return this.api.post(`${PATH}/pin-slips`, pinSlipsSchema, { ids }, { timeout: 60_000 });
  }
}
