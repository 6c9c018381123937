import { vi } from 'vitest';

/** Waits until a condition holds, patiently enough for a busy machine; fails with the condition's own words. */
export function until(condition: () => void): Promise<void> {
  return vi.waitFor(condition, { timeout: 4_000 });
}
