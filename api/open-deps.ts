import { pino } from 'pino';
import { lockDataFolder } from './database/data-folder-lock.js';
import { bookFile, prepareDatabase, prepareDataFolder } from './database/prepare-database.js';
import { Writer } from './database/writer.js';
import type { Deps } from './deps.js';
import { createReportReader } from './features/reports/worker-report-reader.js';
import { AccessTokens, readTokenSecret } from './features/sessions/access-tokens.js';
import { createSignInTries } from './features/sessions/tries.js';
import { createPasswords } from './features/sessions/worker-passwords.js';
import { createFeed } from './features/sync/feed-hub.js';
import { smtpCarrier } from './mail/mail-carrier.js';
import { PostOffice } from './mail/post-office.js';
import { webPushCarrier } from './push/push-carrier.js';
import type { Settings } from './settings.js';

export interface OpenedDeps {
  readonly deps: Deps;
  /** Takes nothing new, finishes what waits, ends streams, closes all and frees the data folder. */
  close(): Promise<void>;
}

/**
 * Opens a data folder for this process alone and makes the real parts on it: for the server, and for commands that
 * work on the book without a port (seed, rebuild). Throws `CannotStart` with a sentence.
 */
export async function openDeps(settings: Settings, overrides: Partial<Deps> = {}): Promise<OpenedDeps> {
  prepareDataFolder(settings.dataDir);
  const lock = lockDataFolder(settings.dataDir);
  try {
    const database = await prepareDatabase(settings.dataDir);
    const now = overrides.now ?? Date.now;
    const parts: Omit<Deps, 'post'> = {
      settings,
      reads: database.reads,
      writer: new Writer(database.writing),
      epoch: database.epoch,
      reports: createReportReader(bookFile(settings.dataDir)),
      feed: createFeed(),
      passwords: createPasswords(),
      tokens: new AccessTokens(readTokenSecret(settings.dataDir), now),
      tries: createSignInTries(),
      carrier: smtpCarrier(),
      push: webPushCarrier(),
      log: pino({ level: settings.logLevel }),
      now,
      ...overrides,
    };
    const deps: Deps = { ...parts, post: overrides.post ?? new PostOffice(parts) };
    return {
      deps,
      close: async () => {
        await deps.post.close();
        await deps.writer.close();
        deps.feed.end();
        deps.tries.close();
        await Promise.all([deps.reports.close(), deps.passwords.close()]);
        await database.close();
        lock.release();
      },
    };
  } catch (error) {
    lock.release();
    throw error;
  }
}
