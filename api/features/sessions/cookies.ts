import type { Request, Response } from 'express';
import { parse } from 'cookie';

/** The two cookies: which tablet this is, and who is signed in here. */
export type CookieKind = 'device' | 'person';

/** A cookie's value: the id of its row and the secret whose hash the row keeps. */
export interface CookieValue {
  readonly id: string;
  readonly secret: string;
}

/** Browsers keep no cookie longer than 400 days; a tablet's is renewed at each refresh. */
export const DEVICE_COOKIE_AGE = 400 * 86_400_000;

export function readCookie(request: Request, kind: CookieKind): CookieValue | null {
  const value = parse(request.headers.cookie ?? '')[nameOf(request, kind)];
  const match = /^([\w:-]{1,64})\.([\w-]{43})$/.exec(value ?? '');
  return match?.[1] && match[2] ? { id: match[1], secret: match[2] } : null;
}

export function setCookie(
  context: { request: Request; response: Response },
  kind: CookieKind,
  value: CookieValue,
  maxAge: number,
): void {
  const { request, response } = context;
  response.cookie(nameOf(request, kind), `${value.id}.${value.secret}`, {
    ...attributes(request),
    maxAge,
  });
}

export function clearCookie(context: { request: Request; response: Response }, kind: CookieKind): void {
  context.response.clearCookie(nameOf(context.request, kind), attributes(context.request));
}

function attributes(request: Request) {
  return { httpOnly: true, sameSite: 'strict', path: '/', secure: isHttps(request) } as const;
}

/** `__Host-` binds a cookie to this very host, and browsers take it under HTTPS alone. */
function nameOf(request: Request, kind: CookieKind): string {
  return `${isHttps(request) ? '__Host-' : ''}shedbeat-${kind}`;
}

/** Cookie routes have an Origin that was found to be ours: it tells what the browser itself sees, proxy or not. */
function isHttps(request: Request): boolean {
  return request.get('origin')?.startsWith('https:') ?? false;
}
