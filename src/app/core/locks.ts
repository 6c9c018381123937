/**
 * Does work under a lock that the browser's tabs share, waiting at most `limit` ms for it. Where locks are missing
 * (no secure context) or the holder hangs, the work is done all the same: nothing correct may depend on the lock.
 */
export async function underLock<T>(name: string, limit: number, work: () => Promise<T>): Promise<T> {
  const locks: LockManager | undefined = globalThis.navigator?.locks;
  if (!locks) return work();
  let begun: Promise<T> | null = null;
  const begin = (): Promise<T> => (begun ??= work());
  try {
    return await locks.request(name, { signal: AbortSignal.timeout(limit) }, begin);
  } catch (error) {
    if (begun !== null) throw error;
    return begin();
  }
}
