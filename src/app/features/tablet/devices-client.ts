import { Injectable, inject } from '@angular/core';
import { deviceListSchema } from '@shared/contract/session';
import { shedListSchema } from '@shared/contract/reports';
import * as z from 'zod/mini';
import { ApiClient } from '../../core/api-client';
import { API } from '../../core/api-paths';

/** The registered tablets and the sheds they may belong to. */
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
    return this.api.post(`${API.devices}/${encodeURIComponent(id)}/revoke`, z.unknown(), {});
  }
}
