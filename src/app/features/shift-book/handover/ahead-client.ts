import { Injectable, inject } from '@angular/core';
import { tacklerAheadSchema, type TacklerAhead } from '@shared/contract/calls';
import type { Answer } from '../../../core/answer';
import { ApiClient } from '../../../core/api-client';

/** Which warps run out, and when. Needs the server. */
@Injectable({ providedIn: 'root' })
export class AheadClient {
  private readonly api = inject(ApiClient);

  ahead(shedId: string, signal: AbortSignal): Promise<Answer<TacklerAhead>> {
    return this.api.get('/api/reports/tackler-ahead', tacklerAheadSchema, { shedId }, { signal });
  }
}
