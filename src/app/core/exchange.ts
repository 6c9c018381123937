import { problemSchema, type ErrorCode, type Problem } from '@shared/contract/errors';
import type * as z from 'zod/mini';
import type { Answer } from './answer';

export interface ExchangeRequest<S extends z.ZodMiniType> {
  readonly method: 'GET' | 'POST' | 'PATCH' | 'DELETE';
  readonly url: string;
  /** JSON, or a picture as it is. */
  readonly body?: unknown;
  readonly token?: string | null;
  /** Keeps the service worker out of the way: sync, streams, uploads. */
  readonly bypass?: boolean;
  /** Milliseconds until the request is given up, 30 s unless said. */
  readonly timeout?: number;
  readonly signal?: AbortSignal;
  readonly answer: S;
}

export type Fetch = (input: string, init: RequestInit) => Promise<Response>;

/** One request and what came of it. Never throws; never believes a body that is not the server's. */
export async function exchange<S extends z.ZodMiniType>(
  fetch: Fetch,
  request: ExchangeRequest<S>,
): Promise<Answer<z.infer<S>>> {
  const limit = AbortSignal.timeout(request.timeout ?? 30_000);
  const signal = request.signal ? AbortSignal.any([limit, request.signal]) : limit;
  let response: Response;
  let text: string;
  try {
    response = await fetch(request.url, {
      method: request.method,
      headers: headersOf(request),
      body: bodyOf(request.body),
      credentials: 'same-origin',
      cache: 'no-store',
      signal,
    });
    text = await response.text();
  } catch {
    if (request.signal?.aborted) return { kind: 'offline', why: 'given-up' };
    return { kind: 'offline', why: limit.aborted ? 'too-slow' : 'no-network' };
  }
  const json = readJson(response, text);
  if (response.ok) {
    if (json === undefined) return { kind: 'offline', why: 'not-our-server' };
    const body = request.answer.safeParse(json);
    return body.success ? { kind: 'ok', body: body.data } : { kind: 'offline', why: 'not-our-server' };
  }
  return classify(response, json);
}

function headersOf(request: ExchangeRequest<z.ZodMiniType>): Record<string, string> {
  const headers: Record<string, string> = { accept: 'application/json, application/problem+json' };
  if (request.body !== undefined)
    headers['content-type'] = request.body instanceof Blob ? request.body.type : 'application/json';
  if (request.token) headers['authorization'] = `Bearer ${request.token}`;
  if (request.bypass) headers['ngsw-bypass'] = 'true';
  return headers;
}

function bodyOf(body: unknown): BodyInit | null {
  if (body === undefined) return null;
  return body instanceof Blob ? body : JSON.stringify(body);
}

function readJson(response: Response, text: string): unknown {
  if (response.status === 204) return null;
  if (!/\bjson\b/.test(response.headers.get('content-type') ?? '')) return undefined;
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/** A failure: ours if it is problem+json with one of our codes; a proxy's by its status; else nobody we know. */
export function classify(response: Response, json: unknown): Answer<never> {
  const retryAfter = readRetryAfter(response.headers.get('retry-after'));
  const problem = problemSchema.safeParse(json);
  if (problem.success) return problemAnswer(problem.data, response.status, retryAfter);
  switch (response.status) {
    // Angular's service worker answers 504 when the network fails; so do proxies whose server is gone.
    case 504:
      return { kind: 'offline', why: 'service-worker' };
    case 401:
      return problemAnswer(made('not-signed-in', 401), 401, retryAfter);
    case 413:
      return problemAnswer(made('too-large', 413), 413, retryAfter);
    case 429:
      return problemAnswer(made('too-many-tries', 429), 429, retryAfter);
    case 502:
    case 503:
      return problemAnswer(made('busy', response.status), response.status, retryAfter);
    default:
      return { kind: 'offline', why: 'not-our-server' };
  }
}

function made(code: ErrorCode, status: number): Problem {
  return { type: 'about:blank', title: code, status, code };
}

function problemAnswer(problem: Problem, status: number, retryAfter: number | null): Answer<never> {
  return { kind: 'problem', status, code: problem.code, problem, retryAfter };
}

/** Seconds only: a date would need the server's clock, and ours may be wrong. */
function readRetryAfter(header: string | null): number | null {
  if (header === null || !/^\d{1,6}$/.test(header.trim())) return null;
  return Number(header) * 1_000;
}
