import { ERRORS, type ErrorCode } from '@shared/contract/errors';
import type { Session, SignedInPerson } from '@shared/contract/session';
import { permissionsOf } from '@shared/contract/roles';
import { MORNING } from './entry-builders';

export const ADA: SignedInPerson = {
  id: 'ada',
  name: 'Ada Hartley',
  shortName: 'Ada',
  worksNumber: '101',
  roles: ['weaver'],
  permissions: [...permissionsOf(['weaver'])],
  shedIds: ['shed-1'],
};

/** What the server answers to sign-in and refresh: Ada on a tablet unless said. */
export function aSession(over: Partial<Session> = {}): Session {
  const person = over.person === undefined ? ADA : over.person;
  return {
    accessToken: 'token-1',
    accessExpiresAt: MORNING + 900_000,
    serverNow: MORNING,
    person,
    grant: person && { id: 'grant-1', personId: person.id, deviceId: 'tablet-1', issuedAt: MORNING },
    device: { id: 'tablet-1', kind: 'tablet', name: 'North 1', shedId: 'shed-1', revoked: false },
    needsFirstManager: false,
    ...over,
  };
}

export interface Asked {
  readonly method: string;
  readonly path: string;
  readonly body: unknown;
  readonly token: string | null;
}
type Answerer = (asked: Asked) => Response | Promise<Response>;

/** Stands where the network is: answers by path, fails like a missing network where nothing is set. */
export class StubServer {
  readonly asked: Asked[] = [];
  private readonly answers = new Map<string, Answerer>();

  on(path: string, answer: Answerer): this {
    this.answers.set(path, answer);
    return this;
  }

  /** The network goes away. */
  unplug(): void {
    this.answers.clear();
  }

  readonly fetch = async (input: string, init: RequestInit): Promise<Response> => {
    const path = input.split('?')[0] ?? input;
    const headers = new Headers(init.headers);
    const asked: Asked = {
      method: init.method ?? 'GET',
      path,
      body: typeof init.body === 'string' ? (JSON.parse(init.body) as unknown) : null,
      token: headers.get('authorization')?.replace(/^Bearer /, '') ?? null,
    };
    this.asked.push(asked);
    const answer = this.answers.get(path);
    if (!answer) throw new TypeError('Failed to fetch');
    return answer(asked);
  };

  countOf(path: string): number {
    return this.asked.filter((one) => one.path === path).length;
  }
}

export function json(body: unknown, status = 200): Response {
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } });
}

export function problemResponse(code: ErrorCode): Response {
  const status = ERRORS[code][0];
  return new Response(JSON.stringify({ type: 'about:blank', title: code, status, code }), {
    status,
    headers: { 'content-type': 'application/problem+json' },
  });
}
