import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * What a manager sets up: alleys, targets, parts, jobs; patterns with their dates; who may see figures by person; and
 * the record of changes, which nobody can edit. A book that is there already tells its tablets that reference data
 * has grown.
 */
export class SetUp1764600000000 implements MigrationInterface {
  readonly name = 'SetUp1764600000000';

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of UP) await runner.query(statement);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const statement of DOWN) await runner.query(statement);
  }
}

const UP = [
  `ALTER TABLE "mill" ADD COLUMN "figuresByPerson" text NOT NULL DEFAULT 'own'`,
  `ALTER TABLE "mill" ADD COLUMN "lockAfterMinutes" integer NOT NULL DEFAULT 5`,
  `ALTER TABLE "cloth" ADD COLUMN "retired" boolean NOT NULL DEFAULT 0`,
  `ALTER TABLE "shift_pattern" ADD COLUMN "rootId" text`,
  `ALTER TABLE "shift_pattern" ADD COLUMN "from" text`,
  `ALTER TABLE "shift_pattern" ADD COLUMN "until" text`,
  `CREATE TABLE "alley" ("shedId" text NOT NULL REFERENCES "shed"("id"), "name" text NOT NULL, "tacklerIds" text NOT NULL, PRIMARY KEY ("shedId", "name"))`,
  `CREATE TABLE "target" ("id" text PRIMARY KEY NOT NULL, "clothId" text NOT NULL REFERENCES "cloth"("id"), "effectiveAt" integer NOT NULL, "efficiency" real, "warpBreaks" real, "weftBreaks" real)`,
  `CREATE TABLE "part" ("id" text PRIMARY KEY NOT NULL, "name" text NOT NULL, "retired" boolean NOT NULL DEFAULT 0)`,
  `CREATE TABLE "job" ("id" text PRIMARY KEY NOT NULL, "name" text NOT NULL, "everyPicks" integer NOT NULL, "retired" boolean NOT NULL DEFAULT 0)`,
  `CREATE TABLE "recorded_change" ("seq" integer PRIMARY KEY AUTOINCREMENT NOT NULL, "at" integer NOT NULL, "by" text, "byName" text NOT NULL, "what" text NOT NULL, "name" text NOT NULL, "action" text NOT NULL, "effectiveAt" integer, "before" text, "after" text, "reason" text)`,
  `CREATE TRIGGER "recorded_change_is_kept" BEFORE DELETE ON "recorded_change" BEGIN SELECT RAISE(ABORT, 'the record of changes is never deleted'); END`,
  `CREATE TRIGGER "recorded_change_stays" BEFORE UPDATE ON "recorded_change" BEGIN SELECT RAISE(ABORT, 'the record of changes is never edited'); END`,
  `CREATE TRIGGER "recorded_change_is_new" BEFORE INSERT ON "recorded_change" WHEN EXISTS (SELECT 1 FROM "recorded_change" WHERE "seq" = NEW."seq") BEGIN SELECT RAISE(ABORT, 'the record of changes is never replaced'); END`,
  `INSERT INTO "change" ("shedId", "kind", "ref", "mark") SELECT NULL, 'reference', '', lower(hex(randomblob(9))) FROM "mill" WHERE "id" = 1`,
];

const DOWN = [
  `DROP TABLE "recorded_change"`,
  `DROP TABLE "job"`,
  `DROP TABLE "part"`,
  `DROP TABLE "target"`,
  `DROP TABLE "alley"`,
  `ALTER TABLE "shift_pattern" DROP COLUMN "until"`,
  `ALTER TABLE "shift_pattern" DROP COLUMN "from"`,
  `ALTER TABLE "shift_pattern" DROP COLUMN "rootId"`,
  `ALTER TABLE "cloth" DROP COLUMN "retired"`,
  `ALTER TABLE "mill" DROP COLUMN "lockAfterMinutes"`,
  `ALTER TABLE "mill" DROP COLUMN "figuresByPerson"`,
];
