import { request } from 'node:http';
import type { Fetch } from '../../../src/app/core/exchange';
import type { WireFault } from './plan';

/** Marks a request whose commit the server's disk is to fail. */
export const DISK_HEADER = 'x-test-disk';

export interface WireParts {
  /** By the number of the request; behind the end the wire is sound. */
  readonly faults: readonly (WireFault | null)[];
  /** What a browser would add: cookie, origin. */
  readonly headers: Readonly<Record<string, string>>;
  readonly killTab: () => void;
}

/**
 * The network between one tablet and the server, and whatever stands in it. A fault is addressed by the number of the
 * tablet's request, so that a schedule can be repeated.
 */
export class FaultWire {
  readonly struck: WireFault[] = [];
  /** Pulled out: no request arrives, and none is counted. */
  cut = false;
  requests = 0;
  /** Bytes of the largest request. */
  largest = 0;
  private late: (() => Promise<unknown>)[] = [];
  private readonly underWay = new Set<Promise<unknown>>();

  constructor(private readonly parts: WireParts) {}

  readonly fetch: Fetch = async (url, init) => {
    if (this.cut) throw lost();
    const fault = this.parts.faults[this.requests++] ?? null;
    if (typeof init.body === 'string') this.largest = Math.max(this.largest, Buffer.byteLength(init.body));
    if (this.requests > MOST) throw new Error('This tablet asks without end.');
    const headers = { ...(init.headers as Record<string, string>), ...this.parts.headers };
    if (fault) return this.harmed(fault, url, { ...init, headers });
    const answer = await send(url, { ...init, headers });
    await this.deliverLate();
    return answer;
  };

  /** What was held back on the way arrives now, after what was sent later. */
  async deliverLate(): Promise<void> {
    for (const deliver of this.late.splice(0)) await deliver().catch(() => undefined);
  }

  /** Everything that is on its way has arrived. */
  async settled(): Promise<void> {
    await this.deliverLate();
    while (this.underWay.size > 0) await Promise.allSettled([...this.underWay]);
  }

  private async harmed(fault: WireFault, url: string, init: RequestInit): Promise<Response> {
    // A middle box that takes small requests only would refuse one entry alone for ever: that is another test's.
    const entries = fault === '413' ? entriesIn(init) : 0;
    if (fault === '413' && entries < 2) return send(url, init);
    this.struck.push(fault);
    switch (fault) {
      case 'request lost':
        throw lost();
      case 'answer lost':
        await (await send(url, init)).arrayBuffer();
        throw lost();
      case 'duplicated': {
        const [first] = await Promise.all([send(url, init), send(url, init).catch(() => null)]);
        return first;
      }
      case 'late':
        this.late.push(() => send(url, { ...init, signal: null }));
        throw lost();
      case 'slow':
        this.leave(send(url, { ...init, signal: null }));
        throw new DOMException('The operation timed out.', 'TimeoutError');
      case 'request cut':
        await sendHalf(url, init);
        throw lost();
      case 'answer cut':
        return half(await send(url, init));
      case 'portal':
        return html('<html>Welcome to our network. Please sign in.</html>', 200);
      case 'worker 504':
        return html('', 504);
      case '413':
        return html('<h1>Request Entity Too Large</h1>', 413);
      case '429':
        return problem(429, 'too-many-tries', { 'retry-after': '2' });
      case '500':
        return problem(500, 'internal');
      case '500 after':
        await (await send(url, init)).arrayBuffer();
        return html('<h1>Internal Server Error</h1>', 500);
      case '503':
        return problem(503, 'busy', { 'retry-after': '1' });
      case '401':
        return problem(401, 'session-ended');
      case 'disk full':
      case 'locked':
        return send(url, { ...init, headers: { ...(init.headers as object), [DISK_HEADER]: fault } });
      case 'tab killed': {
        const answer = await send(url, init);
        this.parts.killTab();
        return answer;
      }
    }
  }

  private leave(work: Promise<unknown>): void {
    const heard = work.catch(() => undefined).finally(() => this.underWay.delete(heard));
    this.underWay.add(heard);
  }
}

/** More than any schedule can need. */
const MOST = 2_000;

async function send(url: string, init: RequestInit): Promise<Response> {
  return globalThis.fetch(url, init);
}

function lost(): TypeError {
  return new TypeError('Failed to fetch');
}

function html(text: string, status: number): Response {
  return new Response(text, { status, headers: { 'content-type': 'text/html' } });
}

function problem(status: number, code: string, headers: Record<string, string> = {}): Response {
  const body = { type: 'about:blank', title: code, status, code };
  return Response.json(body, { status, headers: { 'content-type': 'application/problem+json', ...headers } });
}

function entriesIn(init: RequestInit): number {
  const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : null;
  return body && typeof body === 'object' && 'entries' in body && Array.isArray(body.entries)
    ? body.entries.length
    : 0;
}

/** The head and half of the body arrive, then the connection ends. */
async function half(answer: Response): Promise<Response> {
  const bytes = new Uint8Array(await answer.arrayBuffer());
  const body = new ReadableStream<Uint8Array>({
    start(stream) {
      stream.enqueue(bytes.slice(0, bytes.length >> 1));
      stream.error(new TypeError('terminated'));
    },
  });
  return new Response(body, { status: answer.status, headers: answer.headers });
}

/** The server sees half of the request's body and then the connection's end. */
function sendHalf(url: string, init: RequestInit): Promise<void> {
  const body = Buffer.from(typeof init.body === 'string' ? init.body : '');
  return new Promise((resolve) => {
    const headers = {
      ...(init.headers as Record<string, string>),
      'content-length': String(body.length || 1),
    };
    const sending = request(url, { method: init.method ?? 'GET', headers, agent: false });
    sending.on('error', () => undefined);
    sending.on('close', () => resolve());
    sending.write(body.subarray(0, body.length >> 1), () => sending.destroy());
  });
}
