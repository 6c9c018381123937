import { Injectable, inject } from '@angular/core';
import { AccessToken } from './access-token';

/** Pictures that only the signed-in may see: fetched with the bearer, which an address in a page cannot carry. */
@Injectable({ providedIn: 'root' })
export class PictureClient {
  private readonly token = inject(AccessToken);

  /** Null: there is none, it may not be seen, or nobody answers. Never throws. */
  async get(path: string): Promise<Blob | null> {
    try {
      const first = await this.ask(path);
      const response = first.status === 401 && (await this.token.renew()) ? await this.ask(path) : first;
      const isPicture = /^image\//.test(response.headers.get('content-type') ?? '');
      return response.ok && isPicture ? await response.blob() : null;
    } catch {
      return null;
    }
  }

  private ask(path: string): Promise<Response> {
    const { value } = this.token;
    return globalThis.fetch(path, {
      headers: { 'ngsw-bypass': 'true', ...(value && { authorization: `Bearer ${value}` }) },
      credentials: 'same-origin',
      cache: 'no-store',
      signal: AbortSignal.timeout(30_000),
    });
  }
}
