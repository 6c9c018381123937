import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Mail settings, the queue of letters, one-time links of people, and codes that make a browser a tablet. */
export class LettersAndLinks1764605000000 implements MigrationInterface {
  readonly name = 'LettersAndLinks1764605000000';

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of UP) await runner.query(statement);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of ['tablet_code', 'one_time_link', 'letter', 'mail_settings'])
      await runner.query(`DROP TABLE "${table}"`);
  }
}

const UP = [
  `CREATE TABLE "mail_settings" ("id" integer PRIMARY KEY NOT NULL, "host" text, "port" integer NOT NULL, "security" text NOT NULL, "user" text NOT NULL, "password" text, "from" text NOT NULL, "baseUrl" text)`,
  `CREATE TABLE "letter" ("id" text PRIMARY KEY NOT NULL, "purpose" text NOT NULL, "to" text NOT NULL, "subject" text NOT NULL, "text" text, "html" text, "at" integer NOT NULL, "state" text NOT NULL, "tries" integer NOT NULL, "dueAt" integer, "until" integer, "trouble" text)`,
  `CREATE INDEX "letter_due" ON "letter" ("dueAt") WHERE "dueAt" IS NOT NULL`,
  `CREATE INDEX "letter_at" ON "letter" ("at")`,
  `CREATE TABLE "one_time_link" ("tokenHash" text PRIMARY KEY NOT NULL, "personId" text NOT NULL REFERENCES "person"("id"), "purpose" text NOT NULL, "madeAt" integer NOT NULL, "expiresAt" integer NOT NULL, "usedAt" integer, "voidedAt" integer)`,
  `CREATE INDEX "one_time_link_person" ON "one_time_link" ("personId", "madeAt")`,
  `CREATE TABLE "tablet_code" ("codeHash" text PRIMARY KEY NOT NULL, "name" text NOT NULL, "shedId" text NOT NULL REFERENCES "shed"("id"), "by" text NOT NULL REFERENCES "person"("id"), "madeAt" integer NOT NULL, "expiresAt" integer NOT NULL, "usedAt" integer)`,
];
