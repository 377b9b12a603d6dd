import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Marks runs that are done in moments, which have a thread of their own. */
export class ShortRuns1764560300000 implements MigrationInterface {
  name = 'ShortRuns1764560300000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE runs ADD COLUMN short tinyint NOT NULL DEFAULT 0');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE runs DROP COLUMN short');
  }
}
