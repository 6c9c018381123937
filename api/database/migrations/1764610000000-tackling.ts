import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Photos of repairs, browsers that are told of calls, and a way to a loom's repairs that does not pass every tap. */
export class Tackling1764610000000 implements MigrationInterface {
  readonly name = 'Tackling1764610000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      `CREATE TABLE "photo" ("id" text PRIMARY KEY NOT NULL, "repairId" text NOT NULL, "shedId" text NOT NULL,
        "place" integer NOT NULL, "file" text NOT NULL UNIQUE, "width" integer NOT NULL, "height" integer NOT NULL,
        "bytes" integer NOT NULL, "sentHash" text NOT NULL, "deviceId" text NOT NULL, "receivedAt" integer NOT NULL)`,
    );
    await runner.query(`CREATE UNIQUE INDEX "photo_repair" ON "photo" ("repairId", "place")`);
    await runner.query(
      `CREATE TABLE "push_subscription" ("endpoint" text PRIMARY KEY NOT NULL, "p256dh" text NOT NULL,
        "auth" text NOT NULL, "personId" text NOT NULL, "deviceId" text NOT NULL, "sessionId" text NOT NULL,
        "since" integer NOT NULL)`,
    );
    await runner.query(`CREATE INDEX "push_subscription_person" ON "push_subscription" ("personId")`);
    await runner.query(
      `CREATE INDEX "entry_tackling" ON "entry" ("shedId", "at") WHERE "kind" IN ('repair', 'care')`,
    );
    await runner.query(`CREATE INDEX "loom_line_loom_date" ON "loom_line" ("loomId", "date")`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP INDEX "loom_line_loom_date"`);
    await runner.query(`DROP INDEX "entry_tackling"`);
    await runner.query(`DROP TABLE "push_subscription"`);
    await runner.query(`DROP TABLE "photo"`);
  }
}
