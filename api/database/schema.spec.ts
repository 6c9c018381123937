import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { DataSource, EntityMetadata } from 'typeorm';
import { prepareDatabase, type PreparedDatabase } from './prepare-database.js';

interface ColumnInfo {
  name: string;
  type: string;
  notnull: number;
  pk: number;
}

/** What SQLite has for a column type of TypeORM's. */
const STORED: Record<string, string> = { 'simple-json': 'text', boolean: 'boolean' };

describe('entities and migrations', () => {
  let dataDir: string;
  let database: PreparedDatabase;
  beforeAll(async () => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-test-'));
    database = await prepareDatabase(dataDir);
  });
  afterAll(async () => {
    await database.close();
    rmSync(dataDir, { recursive: true, force: true });
  });

  const ofEntity = (metadata: EntityMetadata) =>
    metadata.columns
      .map((column) => ({
        name: column.databaseName,
        type: STORED[String(column.type)] ?? String(column.type),
        nullable: column.isNullable,
        primary: column.isPrimary,
      }))
      .sort(byName);

  const ofTable = async (from: DataSource, table: string) =>
    (await from.query<ColumnInfo[]>(`PRAGMA table_info("${table}")`))
      .map(({ name, type, notnull, pk }) => ({
        name,
        type: type.toLowerCase(),
        nullable: notnull === 0,
        primary: pk > 0,
      }))
      .sort(byName);

  it('say the same of every column', async () => {
    expect(database.writing.entityMetadatas.length).toBeGreaterThan(20);
    for (const metadata of database.writing.entityMetadatas)
      expect({ [metadata.tableName]: ofEntity(metadata) }).toEqual({
        [metadata.tableName]: await ofTable(database.writing, metadata.tableName),
      });
  });

  it('have the same tables', async () => {
    const tables: { name: string }[] = await database.writing.query(
      `SELECT "name" FROM sqlite_master WHERE "type" = 'table' AND "name" NOT LIKE 'sqlite_%' AND "name" <> 'migrations'`,
    );
    expect(tables.map(({ name }) => name).sort()).toEqual(
      database.writing.entityMetadatas.map(({ tableName }) => tableName).sort(),
    );
  });

  it('can be taken back and made again', async () => {
    const { writing } = database;
    const before = await writing.query('SELECT "name", "sql" FROM sqlite_master ORDER BY "name"');
    for (const migration of writing.migrations) expect(migration.name).toBeTruthy();
    for (let step = 0; step < writing.migrations.length; step++) await writing.undoLastMigration();
    await writing.runMigrations();
    expect(await writing.query('SELECT "name", "sql" FROM sqlite_master ORDER BY "name"')).toEqual(before);
  });
});

function byName(one: { name: string }, other: { name: string }): number {
  return one.name < other.name ? -1 : 1;
}
