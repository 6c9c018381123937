import { EventEmitter, once } from 'node:events';
import type { IncomingMessage, RequestListener } from 'node:http';
import { Readable } from 'node:stream';
import type { PullResponse } from '@shared/contract/sync';
import type { DataSource } from 'typeorm';
import { v7 as uuid } from 'uuid';
import type { Writer } from '../../../api/database/writer.js';
import { BookStore } from '../../../src/app/offline/book-store';
import type { LocalDatabase } from '../../../src/app/offline/local-database';

/** A promise broken on purpose, by what the harness puts around the real parts: the proof must notice. */
export interface Sabotage {
  /** `harmed`: puts a disk under a writer that fails when the wire says so. */
  readonly writer: (writer: Writer, harmed: (writer: Writer) => Writer) => Writer;
  readonly app: (app: RequestListener) => RequestListener;
  readonly book: (database: LocalDatabase) => BookStore;
}

export const NO_SABOTAGE: Sabotage = {
  writer: (writer, harmed) => harmed(writer),
  app: (app) => app,
  book: (database) => new BookStore(database),
};

export const SABOTAGES = {
  'ack-before-commit': {
    ...NO_SABOTAGE,
    writer: (writer, harmed) => acknowledgingEarly(harmed(writer)),
    book: withoutMark,
  },
  'cursor-before-data': { ...NO_SABOTAGE, book: (database) => new CursorFirst(database) },
  'no-dedupe': { ...NO_SABOTAGE, app: withoutDedupe },
  'shared-transaction': {
    ...NO_SABOTAGE,
    writer: (writer, harmed) => harmed(sharingTransactions(writer)),
    book: withoutMark,
  },
} as const satisfies Record<string, Sabotage>;
export type SabotageName = keyof typeof SABOTAGES;

function replaceWrite(writer: Writer, write: Writer['write']): Writer {
  return new Proxy(writer, {
    get(target, name) {
      if (name === 'write') return write;
      const value: unknown = Reflect.get(target, name, target);
      return typeof value === 'function' ? (value.bind(target) as unknown) : value;
    },
  });
}

/** Answers as soon as the work is done, whatever becomes of its commit. */
function acknowledgingEarly(writer: Writer): Writer {
  return replaceWrite(writer, (work, options) => {
    return new Promise((resolve, reject) => {
      writer
        .write(async (tx) => {
          const done = await work(tx);
          resolve(done);
          return done;
        }, options)
        .catch(reject);
    });
  });
}

/** Lets requests write at the same time on the driver's one connection, as it comes. */
function sharingTransactions(writer: Writer): Writer {
  let going: Shared | null = null;
  let dataSource: DataSource | null = null;
  return replaceWrite(writer, async (work) => {
    dataSource ??= await writer.exclusive((each) => Promise.resolve(each));
    const runner = dataSource.createQueryRunner();
    // The driver hands out one query runner: whoever comes while a transaction is open is in it.
    going ??= { depth: 0, failed: false, joined: new EventEmitter() };
    const shared = going;
    if (shared.depth++ === 0) await runner.query('BEGIN');
    else shared.joined.emit('neighbour');
    try {
      return await work(runner.manager);
    } catch (error) {
      shared.failed = true;
      throw error;
    } finally {
      await untilNobodyComes(shared);
      if (--shared.depth === 0) {
        going = null;
        await runner.query(shared.failed ? 'ROLLBACK' : 'COMMIT');
      }
    }
  });
}

interface Shared {
  depth: number;
  failed: boolean;
  readonly joined: EventEmitter;
}

/** Nobody comes for so long: a round's pushes arrive together, and slowly where the machine has much to do. */
const ALONE = 300;

async function untilNobodyComes({ joined }: Shared): Promise<void> {
  for (;;) {
    const enough = AbortSignal.timeout(ALONE);
    const came = await once(joined, 'neighbour', { signal: enough }).catch(() => null);
    if (came === null) return;
  }
}

/** A server to which an entry that is sent again is a new one. */
function withoutDedupe(app: RequestListener): RequestListener {
  const seen = new Set<string>();
  return (message, answer) => {
    if (message.url !== '/api/sync/entries') return app(message, answer);
    let text = '';
    message.setEncoding('utf8');
    message.on('error', () => undefined);
    message.on('data', (part: string) => (text += part));
    message.on('end', () => {
      const renamed = new Map<string, string>();
      const body = text.replace(/"id":"([0-9a-f-]{36})"/g, (whole, id: string) => {
        if (!seen.has(id)) {
          seen.add(id);
          return whole;
        }
        const other = uuid();
        renamed.set(other, id);
        return `"id":"${other}"`;
      });
      const end = answer.end.bind(answer);
      const named = (said: unknown): unknown =>
        typeof said === 'string' || said instanceof Uint8Array
          ? [...renamed].reduce((now, [other, id]) => now.replaceAll(other, id), Buffer.from(said).toString())
          : said;
      answer.end = ((chunk: unknown, ...rest: []) => end(named(chunk), ...rest)) as typeof answer.end;
      app(replayed(message, body), answer);
    });
  };
}

function replayed(message: IncomingMessage, body: string): IncomingMessage {
  const bytes = Buffer.from(body);
  const again = Object.assign(Readable.from([bytes]), {
    headers: { ...message.headers, 'content-length': String(bytes.length), 'accept-encoding': 'identity' },
    method: message.method,
    url: message.url,
    httpVersion: message.httpVersion,
    httpVersionMajor: message.httpVersionMajor,
    httpVersionMinor: message.httpVersionMinor,
    rawHeaders: message.rawHeaders,
    socket: message.socket,
    connection: message.socket,
  });
  return again as unknown as IncomingMessage;
}

/**
 * By its mark a tablet may notice at once that the book lost what it had acknowledged, and send it again: that mends
 * the harm, not the broken promise. Without it the proof sees each.
 */
function withoutMark(database: LocalDatabase): BookStore {
  return new WithoutMark(database);
}

class WithoutMark extends BookStore {
  override mark(): Promise<null> {
    return Promise.resolve(null);
  }
}

/** Stores the cursor first and the data after it. */
class CursorFirst extends BookStore {
  constructor(private readonly local: LocalDatabase) {
    super(local);
  }

  override async apply(pull: PullResponse): Promise<void> {
    await this.local.transact(['facts'], 'readwrite', (transaction) => {
      transaction.objectStore('facts').put({ v: 1, value: pull.cursor }, 'cursor');
    });
    await super.apply(pull);
  }
}
