import { Injectable, inject } from '@angular/core';
import {
  shedListSchema,
  shiftListSchema,
  shiftSheetSchema,
  weeksSchema,
  type ShiftList,
  type ShiftSheet,
  type Weeks,
} from '@shared/contract/reports';
import type * as z from 'zod/mini';
import type { Answer } from './answer';
import { ApiClient } from './api-client';

export type ShedList = z.infer<typeof shedListSchema>;
export interface DateRange {
  readonly shedId: string;
  readonly from: string;
  readonly to: string;
}
export interface WeeksQuery extends DateRange {
  readonly by: 'loom' | 'row';
}

/** The book's reports. They need the server: nothing of them is kept on the device. */
@Injectable({ providedIn: 'root' })
export class ReportsClient {
  private readonly api = inject(ApiClient);

  sheds(signal?: AbortSignal): Promise<Answer<ShedList>> {
    return this.api.get('/api/reports/sheds', shedListSchema, {}, given(signal));
  }

  shifts(query: DateRange, signal?: AbortSignal): Promise<Answer<ShiftList>> {
    return this.api.get('/api/reports/shifts', shiftListSchema, { ...query }, given(signal));
  }

  sheet(shiftKey: string, signal?: AbortSignal): Promise<Answer<ShiftSheet>> {
    const path = `/api/reports/shifts/${encodeURIComponent(shiftKey)}/sheet`;
    return this.api.get(path, shiftSheetSchema, {}, given(signal));
  }

  weeks(query: WeeksQuery, signal?: AbortSignal): Promise<Answer<Weeks>> {
    return this.api.get('/api/reports/weeks', weeksSchema, { ...query }, given(signal));
  }
}

const given = (signal: AbortSignal | undefined) => (signal ? { signal } : {});
