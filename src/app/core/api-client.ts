import { Injectable, inject } from '@angular/core';
import type * as z from 'zod/mini';
import { AccessToken } from './access-token';
import type { Answer } from './answer';
import { exchange, type ExchangeRequest, type Fetch } from './exchange';

type Options = Partial<Pick<ExchangeRequest<z.ZodMiniType>, 'bypass' | 'timeout' | 'signal'>>;
type Query = Readonly<Record<string, string | number | boolean | undefined>>;

/** Talks to the server with the bearer; a 401 renews the token once and asks again. Answers, never throws. */
@Injectable({ providedIn: 'root' })
export class ApiClient {
  private readonly token = inject(AccessToken);
  private readonly fetch: Fetch = (input, init) => globalThis.fetch(input, init);

  get<S extends z.ZodMiniType>(
    path: string,
    answer: S,
    query: Query = {},
    options: Options = {},
  ): Promise<Answer<z.infer<S>>> {
    return this.send({ ...options, method: 'GET', url: withQuery(path, query), answer });
  }

  post<S extends z.ZodMiniType>(
    path: string,
    answer: S,
    body: unknown,
    options: Options = {},
  ): Promise<Answer<z.infer<S>>> {
    return this.send({ ...options, method: 'POST', url: path, body, answer });
  }

  patch<S extends z.ZodMiniType>(path: string, answer: S, body: unknown): Promise<Answer<z.infer<S>>> {
    return this.send({ method: 'PATCH', url: path, body, answer });
  }

  /** Cookie routes of the session itself: no bearer, no renewal. */
  bare<S extends z.ZodMiniType>(path: string, answer: S, body: unknown): Promise<Answer<z.infer<S>>> {
    return exchange(this.fetch, { method: 'POST', url: path, body, answer, timeout: 15_000, bypass: true });
  }

  async send<S extends z.ZodMiniType>(request: ExchangeRequest<S>): Promise<Answer<z.infer<S>>> {
    const first = await exchange(this.fetch, { ...request, token: this.token.value });
    if (first.kind !== 'problem' || first.status !== 401) return first;
    if (!(await this.token.renew())) return first;
    return exchange(this.fetch, { ...request, token: this.token.value });
  }
}

/** A path with its query; undefined values are left out. */
export function withQuery(path: string, query: Query): string {
  const parameters = new URLSearchParams();
  for (const [key, value] of Object.entries(query))
    if (value !== undefined) parameters.set(key, String(value));
  const text = parameters.toString();
  return text ? `${path}?${text}` : path;
}
