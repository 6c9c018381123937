import { Injectable } from '@angular/core';

/** The access token, in memory only, and the way to a new one. Stands between `ApiClient` and `SessionStore`. */
@Injectable({ providedIn: 'root' })
export class AccessToken {
  value: string | null = null;
  /** Set by `SessionStore`. Resolves to whether there is a new token. */
  renew: () => Promise<boolean> = () => Promise.resolve(false);
}
