import { Injectable, inject } from '@angular/core';
import { type newTabletCodeSchema, tabletCodeSchema } from '@shared/contract/one-time';
import { shedListSchema } from '@shared/contract/reports';
import { deviceListSchema, deviceRowSchema } from '@shared/contract/session';
import type * as z from 'zod/mini';
import { ApiClient } from './api-client';
import { API } from './api-paths';

/** The registered tablets, the sheds they may belong to, and the ways to look after them. */
@Injectable({ providedIn: 'root' })
export class DevicesClient {
  private readonly api = inject(ApiClient);

  sheds() {
    return this.api.get('/api/reports/sheds', shedListSchema);
  }

  devices() {
    return this.api.get(API.devices, deviceListSchema);
  }

  revoke(id: string) {
    return this.api.post(`${API.devices}/${encodeURIComponent(id)}/revoke`, deviceRowSchema, {});
  }

  rename(id: string, name: string) {
    return this.api.patch(`${API.devices}/${encodeURIComponent(id)}`, deviceRowSchema, { name });
  }

  /** A code that makes another browser a tablet of the shed. */
  newCode(asked: z.infer<typeof newTabletCodeSchema>) {
    return this.api.post(`${API.devices}/codes`, tabletCodeSchema, asked);
  }
}
