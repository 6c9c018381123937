import type { DataSource } from 'typeorm';
import type { Logger } from 'pino';
import type { Writer } from './database/writer.js';
import type { Feed } from './features/sync/feed.js';
import type { ReportReader } from './features/reports/report-reader.js';
import type { AccessTokens } from './features/sessions/access-tokens.js';
import type { Passwords } from './features/sessions/passwords.js';
import type { SignInTries } from './features/sessions/tries.js';
import type { MailCarrier } from './mail/mail-carrier.js';
import type { PostOffice } from './mail/post-office.js';
import type { PushCarrier } from './push/push-carrier.js';
import type { Settings } from './settings.js';

/** What the application is made with: real parts, handed in so that a test can make its own. */
export interface Deps {
  readonly settings: Settings;
  /** Small reads on the request's path (sessions, people): a read-only connection of its own. */
  readonly reads: DataSource;
  readonly writer: Writer;
  /** Names this book; devices notice by it that another one took its place. */
  readonly epoch: string;
  /** Heavy reads, in a worker thread. */
  readonly reports: ReportReader;
  readonly feed: Feed;
  /** bcrypt in worker threads. */
  readonly passwords: Passwords;
  readonly tokens: AccessTokens;
  readonly tries: SignInTries;
  /** What letters leave by, and the queue before it. */
  readonly carrier: MailCarrier;
  readonly post: PostOffice;
  /** What word of calls leaves by. */
  readonly push: PushCarrier;
  readonly log: Logger;
  /** Milliseconds since 1970. */
  readonly now: () => number;
}
