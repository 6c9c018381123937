import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { DeviceRow, GrantRow } from '../../../api/database/entities/index.js';
import { hashOfSecret } from '../../../api/features/sessions/secrets.js';
import type { Passwords } from '../../../api/features/sessions/passwords.js';
import { openDeps } from '../../../api/open-deps.js';
import {
  insertTestMill,
  MILL_SINCE,
  TEST_NOW,
  TEST_PEOPLE,
  TEST_SETTINGS,
} from '../../../api/testing/test-server.js';
import { TABLETS } from './plan';

/** Nobody signs in with a PIN here: what a sign-in leaves behind stands in the template. */
export const noPasswords: Passwords = {
  hash: () => Promise.resolve('-'),
  compare: () => Promise.resolve(false),
  close: () => Promise.resolve(),
};

export const SECRET = 't'.repeat(43);
export const tabletId = (n: number): string => `tablet-${n + 1}`;
export const grantOf = (personId: string, deviceId: string): string => `${personId}.${deviceId}`;

/** A data folder with the test mill and three registered tablets, on each of which everybody has signed in once. */
export async function templateMill(): Promise<string> {
  const dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-faults-template-'));
  const opened = await openDeps(
    { ...TEST_SETTINGS, dataDir },
    { now: () => TEST_NOW, passwords: noPasswords },
  );
  await opened.deps.writer.write(async (tx) => {
    await insertTestMill(tx, { pinHash: '-', passwordHash: '-' });
    for (let n = 0; n < TABLETS; n++) {
      await tx.getRepository(DeviceRow).insert({
        id: tabletId(n),
        kind: 'tablet',
        name: `Tablet ${n + 1}`,
        shedId: 'north',
        secretHash: hashOfSecret(SECRET),
        registeredBy: TEST_PEOPLE.manager.id,
        registeredAt: MILL_SINCE,
        revokedAt: null,
        lastSeenAt: null,
        clockOffset: null,
        appVersion: null,
      });
      for (const { id } of Object.values(TEST_PEOPLE))
        await tx.getRepository(GrantRow).insert({
          id: grantOf(id, tabletId(n)),
          personId: id,
          deviceId: tabletId(n),
          issuedAt: MILL_SINCE,
        });
    }
  });
  await opened.close();
  return dataDir;
}
