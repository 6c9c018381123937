import { AsyncLocalStorage } from 'node:async_hooks';
import { copyFileSync, cpSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer, type IncomingMessage, type RequestListener, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createApp } from '../../../api/app.js';
import { restoreBook } from '../../../api/backup/restore-book.js';
import { takeBackup } from '../../../api/backup/take-backup.js';
import { bookFile } from '../../../api/database/prepare-database.js';
import type { Writer } from '../../../api/database/writer.js';
import type { Deps } from '../../../api/deps.js';
import { openDeps, type OpenedDeps } from '../../../api/open-deps.js';
import { TEST_NOW, TEST_SETTINGS } from '../../../api/testing/test-server.js';
import { DISK_HEADER } from './fault-wire';
import { NO_SABOTAGE, type Sabotage } from './sabotage';
import { noPasswords } from './template-mill';

/** The disk that the request under way is to find. */
const disk = new AsyncLocalStorage<string | undefined>();

/** The real server on a real file and a real port, which can be stopped, started, restored and copied over. */
export class FaultServer {
  readonly clock = { now: TEST_NOW };
  port = 0;
  private opened: OpenedDeps | null = null;
  private http: Server | null = null;
  private backups = 0;
  private backup: string | null = null;
  private pushed: (() => void) | null = null;

  private constructor(
    readonly dataDir: string,
    private readonly sabotage: Sabotage,
  ) {}

  static async start(template: string, sabotage: Sabotage = NO_SABOTAGE): Promise<FaultServer> {
    const dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-faults-'));
    cpSync(template, dataDir, { recursive: true });
    const server = new FaultServer(dataDir, sabotage);
    await server.boot();
    return server;
  }

  get url(): string {
    return `http://127.0.0.1:${this.port}`;
  }

  get deps(): Deps {
    if (!this.opened) throw new Error('The server is stopped.');
    return this.opened.deps;
  }

  /** Resolves when the next push has arrived and is being worked on. */
  nextPush(): Promise<void> {
    return new Promise((resolve) => (this.pushed = resolve));
  }

  /** Everything under way is broken off; what the writer had begun is finished or undone. */
  async restart(): Promise<void> {
    await this.stop();
    await this.boot();
  }

  async takeBackup(): Promise<void> {
    this.backups++;
    // Two within one second would have one name.
    const now = () => this.clock.now + this.backups * 1_000;
    this.backup = (await takeBackup({ ...this.deps, now })).file;
  }

  /** `npm run restore`, or a file copied into place by hand. */
  async putBack(how: 'restored backup' | 'copied file'): Promise<boolean> {
    if (this.backup === null) return false;
    await this.stop();
    if (how === 'restored backup') restoreBook(this.dataDir, this.backup, this.clock.now + this.backups++);
    else {
      for (const end of ['', '-wal', '-shm']) rmSync(`${bookFile(this.dataDir)}${end}`, { force: true });
      copyFileSync(this.backup, bookFile(this.dataDir));
    }
    await this.boot();
    return true;
  }

  async close(): Promise<void> {
    await this.stop();
    rmSync(this.dataDir, { recursive: true, force: true });
  }

  private async boot(): Promise<void> {
    const settings = { ...TEST_SETTINGS, dataDir: this.dataDir, backupsKept: 100 };
    this.opened = await openDeps(settings, { now: () => this.clock.now, passwords: noPasswords });
    const { deps } = this.opened;
    const writer = this.sabotage.writer(deps.writer, withFailingDisk);
    const app: RequestListener = this.sabotage.app(createApp({ ...deps, writer }));
    const listener: RequestListener = (message, answer) => {
      if (message.url === '/api/sync/entries') this.sayPushed();
      disk.run(diskOf(message), () => app(message, answer));
    };
    const http = createServer({ keepAliveTimeout: 60_000 }, listener);
    this.http = http;
    await new Promise<void>((resolve) => http.listen(this.port, '127.0.0.1', resolve));
    this.port = (http.address() as AddressInfo).port;
  }

  private async stop(): Promise<void> {
    const { http, opened } = this;
    this.http = null;
    this.opened = null;
    http?.closeAllConnections();
    await new Promise((resolve) => (http ? http.close(resolve) : resolve(null)));
    await opened?.close();
  }

  private sayPushed(): void {
    this.pushed?.();
    this.pushed = null;
  }
}

function diskOf(message: IncomingMessage): string | undefined {
  const said = message.headers[DISK_HEADER];
  return typeof said === 'string' ? said : undefined;
}

/** A writer whose disk is full, or whose file is locked, when it comes to the commit of a marked request. */
function withFailingDisk(writer: Writer): Writer {
  return new Proxy(writer, {
    get(target, name) {
      if (name === 'write') {
        const write: Writer['write'] = (work, options) =>
          target.write(async (tx) => {
            const fails = disk.getStore();
            const done = await work(tx);
            if (fails !== undefined) throw diskError(fails);
            return done;
          }, options);
        return write;
      }
      const value: unknown = Reflect.get(target, name, target);
      return typeof value === 'function' ? (value.bind(target) as unknown) : value;
    },
  });
}

function diskError(fails: string): Error {
  return fails === 'locked'
    ? Object.assign(new Error('database is locked'), { code: 'SQLITE_BUSY' })
    : Object.assign(new Error('database or disk is full'), { code: 'SQLITE_FULL' });
}
