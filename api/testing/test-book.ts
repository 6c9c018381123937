import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import type { PushResult } from '../../shared/contract/sync.js';
import type { LoomLine } from '../../shared/entries/loom-line.js';
import { createDataSource } from '../database/data-source.js';
import type { LoomLineRow } from '../database/entities/index.js';
import { Writer } from '../database/writer.js';
import { ingestEntries, type IngestContext } from '../features/book/ingest.js';
import { insertTestGrants } from './test-entries.js';
import { insertTestMill, TEST_NOW, TEST_TABLETS } from './test-mill.js';

/** A book over a real SQLite file with the real migrations, without a server. */
export interface TestBook {
  readonly data: DataSource;
  readonly writer: Writer;
  readonly file: string;
  /** Pushes as the first tablet, whose clock is right, at the test clock's start unless said. */
  push(entries: readonly unknown[], context?: Partial<IngestContext>): Promise<PushResult[]>;
  lineRow(shiftKey: string, loomId: string): Promise<LoomLineRow>;
  line(shiftKey: string, loomId: string): Promise<LoomLine>;
  close(): Promise<void>;
}

export async function testBook(): Promise<TestBook> {
  const folder = mkdtempSync(join(tmpdir(), 'shedbeat-book-'));
  const file = join(folder, 'book.sqlite');
  const data = createDataSource(file);
  await data.initialize();
  await data.runMigrations();
  const writer = new Writer(data);
  await writer.write(async (tx) => {
    await insertTestMill(tx, { pinHash: '-', passwordHash: '-' });
    await insertTestGrants(tx);
  });
  const lineRow = async (shiftKey: string, loomId: string) => {
    const [row] = await data.query<LoomLineRow[]>(
      `SELECT * FROM "loom_line" WHERE "shiftKey" = ? AND "loomId" = ?`,
      [shiftKey, loomId],
    );
    if (!row) throw new Error(`No line ${shiftKey} ${loomId}.`);
    return row;
  };
  return {
    data,
    writer,
    file,
    push: async (entries, context = {}) => {
      const serverNow = context.serverNow ?? TEST_NOW;
      const { results } = await writer.write((tx) =>
        ingestEntries(tx, entries, {
          deviceId: TEST_TABLETS.north.id,
          deviceRevoked: false,
          tabletShedId: 'north',
          sentAt: serverNow,
          serverNow,
          ...context,
        }),
      );
      return results;
    },
    lineRow,
    line: async (shiftKey, loomId) => JSON.parse((await lineRow(shiftKey, loomId)).line) as LoomLine,
    close: async () => {
      await writer.close();
      await data.destroy();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
