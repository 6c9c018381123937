import { Injectable, inject } from '@angular/core';
import {
  heldEntriesSchema,
  loomRecordSchema,
  signedVersionsSchema,
  type HeldEntries,
  type LoomRecord,
  type SignedVersions,
} from '@shared/contract/shift-records';
import type { Answer } from '../../core/answer';
import { ApiClient } from '../../core/api-client';

/** What the foreman asks of a shift beyond its sheet. Needs the server, as every report does. */
@Injectable({ providedIn: 'root' })
export class ShiftRecordsClient {
  private readonly api = inject(ApiClient);

  loom(shiftKey: string, loomId: string, signal: AbortSignal): Promise<Answer<LoomRecord>> {
    return this.api.get(
      `${pathOf(shiftKey)}/looms/${encodeURIComponent(loomId)}`,
      loomRecordSchema,
      {},
      { signal },
    );
  }

  held(shiftKey: string, signal: AbortSignal): Promise<Answer<HeldEntries>> {
    return this.api.get(`${pathOf(shiftKey)}/held`, heldEntriesSchema, {}, { signal });
  }

  signed(shiftKey: string, signal: AbortSignal): Promise<Answer<SignedVersions>> {
    return this.api.get(`${pathOf(shiftKey)}/signed`, signedVersionsSchema, {}, { signal });
  }
}

const pathOf = (shiftKey: string) => `/api/reports/shifts/${encodeURIComponent(shiftKey)}`;
