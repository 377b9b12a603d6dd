import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Series of runs; a run no longer belongs to one series, since several may share it. */
export class Series1764560200000 implements MigrationInterface {
  name = 'Series1764560200000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`CREATE TABLE series (id uuid NOT NULL PRIMARY KEY, labId uuid NOT NULL, ownerId uuid NOT NULL,
      name varchar(200) NOT NULL, systemId uuid NOT NULL, revision int NOT NULL, vary json NOT NULL, runIds json NOT NULL,
      createdAt datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3), INDEX (labId),
      FOREIGN KEY (labId) REFERENCES labs (id), FOREIGN KEY (systemId) REFERENCES systems (id) ON DELETE CASCADE)`);
    await runner.query('ALTER TABLE runs DROP COLUMN seriesId');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE runs ADD COLUMN seriesId uuid NULL, ADD INDEX (seriesId)');
    await runner.query('DROP TABLE series');
  }
}
