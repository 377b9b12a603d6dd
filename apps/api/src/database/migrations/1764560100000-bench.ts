import type { MigrationInterface, QueryRunner } from 'typeorm';

const stamp = 'datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3)';

/** Systems with their revisions, runs and results. */
export class Bench1764560100000 implements MigrationInterface {
  name = 'Bench1764560100000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`CREATE TABLE systems (id uuid NOT NULL PRIMARY KEY, labId uuid NOT NULL, ownerId uuid NOT NULL,
      name varchar(200) NOT NULL, shared tinyint NOT NULL DEFAULT 0, archived tinyint NOT NULL DEFAULT 0,
      latestRevision int NOT NULL, nuclides json NOT NULL, nucleusCount int NOT NULL, originId uuid NULL,
      originRevision int NULL, version int NOT NULL DEFAULT 1, createdAt ${stamp}, updatedAt datetime(3) NOT NULL,
      INDEX (labId, name), FOREIGN KEY (labId) REFERENCES labs (id), FOREIGN KEY (ownerId) REFERENCES users (id))`);
    await runner.query(`CREATE TABLE revisions (id uuid NOT NULL PRIMARY KEY, systemId uuid NOT NULL, number int NOT NULL,
      document json NOT NULL, note varchar(2000) NULL, authorId uuid NOT NULL, createdAt ${stamp},
      UNIQUE (systemId, number), FOREIGN KEY (systemId) REFERENCES systems (id), FOREIGN KEY (authorId) REFERENCES users (id))`);
    await runner.query(`CREATE TABLE runs (id uuid NOT NULL PRIMARY KEY, labId uuid NOT NULL, ownerId uuid NOT NULL,
      systemId uuid NOT NULL, revision int NOT NULL, systemName varchar(200) NOT NULL, \`system\` json NOT NULL,
      experiment json NOT NULL, engine varchar(20) NOT NULL, identity char(64) NOT NULL, requestKey varchar(140) NULL UNIQUE,
      seriesId uuid NULL, state varchar(20) NOT NULL DEFAULT 'queued', progress double NOT NULL DEFAULT 0,
      attempts int NOT NULL DEFAULT 0, lease uuid NULL, leaseUntil datetime(3) NULL, createdAt ${stamp},
      startedAt datetime(3) NULL, finishedAt datetime(3) NULL, seconds double NULL, method varchar(300) NULL,
      warnings int NOT NULL DEFAULT 0, error varchar(2000) NULL,
      INDEX (labId, createdAt), INDEX (state, createdAt), INDEX (identity), INDEX (systemId), INDEX (seriesId),
      FOREIGN KEY (labId) REFERENCES labs (id), FOREIGN KEY (systemId) REFERENCES systems (id),
      FOREIGN KEY (ownerId) REFERENCES users (id))`);
    await runner.query(`CREATE TABLE results (runId uuid NOT NULL PRIMARY KEY, report json NOT NULL, \`lines\` json NULL,
      firstPpm double NOT NULL, lastPpm double NOT NULL, dwell double NOT NULL, arrays longblob NOT NULL,
      FOREIGN KEY (runId) REFERENCES runs (id))`);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of ['results', 'runs', 'revisions', 'systems']) await runner.query(`DROP TABLE ${table}`);
  }
}
