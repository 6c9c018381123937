import { Injectable, inject } from '@angular/core';
import {
  letterSchema,
  lettersSchema,
  letterTextSchema,
  mailSettingsSchema,
  type MailForm,
} from '@shared/contract/set-up';
import { ApiClient } from '../../../core/api-client';

/** Mail settings and the letters that went out, wait or lie here. */
@Injectable({ providedIn: 'root' })
export class MailClient {
  private readonly api = inject(ApiClient);

  settings() {
    return this.api.get('/api/set-up/mail', mailSettingsSchema);
  }

  save(form: MailForm) {
    return this.api.patch('/api/set-up/mail', mailSettingsSchema, form);
  }

  /** Waits for the mail server's answer: a slow one takes seconds. */
  test(to: string) {
    return this.api.post('/api/set-up/mail/test', letterSchema, { to }, { timeout: 30_000 });
  }

  letters() {
    return this.api.get('/api/set-up/letters', lettersSchema);
  }

  /** Waits for the mail server's answer, like a test letter. */
  again(id: string) {
    return this.api.post(
      `/api/set-up/letters/${encodeURIComponent(id)}/again`,
      letterSchema,
      {},
      { timeout: 30_000 },
    );
  }

  letter(id: string) {
    return this.api.get(`/api/set-up/letters/${encodeURIComponent(id)}`, letterTextSchema);
  }
}
