import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * A mark of chance on every change, so that two books that went apart never agree by accident on what a number was;
 * and what a device says of itself: how many entries wait on it, whether its browser keeps its storage.
 */
export class MarksAndTablets1764590400000 implements MigrationInterface {
  readonly name = 'MarksAndTablets1764590400000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "change" ADD COLUMN "mark" text`);
    await runner.query(`ALTER TABLE "device" ADD COLUMN "waiting" integer`);
    await runner.query(`ALTER TABLE "device" ADD COLUMN "persisted" boolean`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "device" DROP COLUMN "persisted"`);
    await runner.query(`ALTER TABLE "device" DROP COLUMN "waiting"`);
    await runner.query(`ALTER TABLE "change" DROP COLUMN "mark"`);
  }
}
