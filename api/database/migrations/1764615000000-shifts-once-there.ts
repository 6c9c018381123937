import type { MigrationInterface, QueryRunner } from 'typeorm';

/** A way to whether a shift was ever there, that does not pass every entry: for what names one that set-up took out. */
export class ShiftsOnceThere1764615000000 implements MigrationInterface {
  readonly name = 'ShiftsOnceThere1764615000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`CREATE INDEX "change_of_shift" ON "change" ("ref") WHERE "kind" = 'shift'`);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP INDEX "change_of_shift"`);
  }
}
