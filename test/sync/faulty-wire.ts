import type { Fetch } from '../../src/app/core/exchange';

/** What the wire does to one request. */
export type Fault = 'none' | 'request lost' | 'answer lost' | 'portal';

/**
 * The network between a simulated tablet and a real server: loses requests before they arrive, loses answers after
 * the server has acted on them, or is a captive portal that answers for itself. It does not reorder or alter bytes.
 */
export function faultyWire(fault: () => Fault): { readonly fetch: Fetch; readonly seen: Map<Fault, number> } {
  const seen = new Map<Fault, number>();
  const fetch: Fetch = async (input, init) => {
    const now = fault();
    seen.set(now, (seen.get(now) ?? 0) + 1);
    if (now === 'request lost') throw new TypeError('Failed to fetch');
    if (now === 'portal')
      return new Response('<html>Welcome</html>', { headers: { 'content-type': 'text/html' } });
    const response = await globalThis.fetch(input, init);
    if (now === 'answer lost') {
      await response.arrayBuffer();
      throw new TypeError('Failed to fetch');
    }
    return response;
  };
  return { fetch, seen };
}

/** Numbers in [0, 1) by a seed (mulberry32), so that a failing run can be run again. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
}
