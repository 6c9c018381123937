import 'fake-indexeddb/auto';
import type { Grant, SignedInPerson } from '@shared/contract/session';
import { MORNING } from '../testing/entry-builders';
import { WatchedFactory } from '../testing/watched-factory';
import { LocalDatabase } from './local-database';
import { OfflineUnlock } from './offline-unlock';
import { makeVerifier, PIN_ITERATIONS } from './pin-verifier';

const ada: SignedInPerson = {
  id: 'ada',
  name: 'Ada Hartley',
  shortName: 'Ada',
  worksNumber: '101',
  roles: ['weaver'],
  permissions: ['public', 'self', 'entries.push', 'changes.read'],
  shedIds: ['shed-1'],
};
const grant: Grant = { id: 'grant-1', personId: 'ada', deviceId: 'tablet-1', issuedAt: MORNING };

async function setUp() {
  const watched = new WatchedFactory();
  const time = { now: MORNING };
  // Few iterations: the real count has a test of its own.
  const start = () => new OfflineUnlock(new LocalDatabase(watched.factory), () => time.now, 10);
  const unlock = start();
  await unlock.remember(ada, grant, '246810');
  return { watched, time, start, unlock };
}

describe('OfflineUnlock', () => {
  it('lets in whoever has signed in here, with the grant of that sign-in, after a restart too', async () => {
    const { start } = await setUp();
    expect(await start().unlock('101', '246810')).toEqual({ is: 'unlocked', person: ada, grant });
  });

  it('lets in nobody else and by no other PIN', async () => {
    const { unlock } = await setUp();
    expect(await unlock.unlock('101', '246811')).toEqual({ is: 'wrong' });
    expect(await unlock.unlock('102', '246810')).toEqual({ is: 'unknown' });
  });

  it('makes wrong PINs wait longer and longer, over restarts, and a right one start anew', async () => {
    const { time, start } = await setUp();
    for (let i = 0; i < 3; i++) expect(await start().unlock('101', '000000')).toEqual({ is: 'wrong' });
    expect(await start().unlock('101', '246810')).toEqual({ is: 'wait', waitMs: 5_000 });
    time.now += 5_000;
    expect(await start().unlock('101', '000000')).toEqual({ is: 'wrong' });
    expect(await start().unlock('101', '246810')).toEqual({ is: 'wait', waitMs: 10_000 });
    time.now += 10_000;
    expect(await start().unlock('101', '246810')).toMatchObject({ is: 'unlocked' });
    expect(await start().unlock('101', '000000')).toEqual({ is: 'wrong' });
    expect(await start().unlock('101', '246810')).toMatchObject({ is: 'unlocked' });
  });

  it('locks nobody out for longer than a quarter of an hour when the clock is set back', async () => {
    const { time, unlock } = await setUp();
    for (let i = 0; i < 3; i++) await unlock.unlock('101', '000000');
    time.now -= 5 * 86_400_000;
    expect(await unlock.unlock('101', '246810')).toEqual({ is: 'wait', waitMs: 15 * 60_000 });
  });

  it('forgets a person whom the server no longer takes', async () => {
    const { unlock } = await setUp();
    await unlock.forget('101');
    expect(await unlock.unlock('101', '246810')).toEqual({ is: 'unknown' });
  });

  it('keeps a salted PBKDF2 verifier of at least 310,000 rounds, never the PIN', async () => {
    const one = await makeVerifier('246810');
    const other = await makeVerifier('246810');
    expect(PIN_ITERATIONS).toBeGreaterThanOrEqual(310_000);
    expect(one.iterations).toBe(PIN_ITERATIONS);
    expect(one.hash).toHaveLength(32);
    expect([...one.hash]).not.toEqual([...other.hash]);
  });
});
