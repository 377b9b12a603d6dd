import type { MigrationInterface, QueryRunner } from 'typeorm';

const stamp = 'datetime(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3)';

/** People, labs, memberships, sessions, tokens, invitations. */
export class People1764560000000 implements MigrationInterface {
  name = 'People1764560000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`CREATE TABLE users (id uuid NOT NULL PRIMARY KEY, name varchar(120) NOT NULL,
      email varchar(254) NOT NULL UNIQUE, passwordHash varchar(80) NOT NULL, createdAt ${stamp})`);
    await runner.query(`CREATE TABLE labs (id uuid NOT NULL PRIMARY KEY, name varchar(120) NOT NULL,
      version int NOT NULL, createdAt ${stamp})`);
    await runner.query(`CREATE TABLE memberships (id uuid NOT NULL PRIMARY KEY, labId uuid NOT NULL, userId uuid NOT NULL,
      role varchar(20) NOT NULL, joinedAt ${stamp}, UNIQUE (labId, userId), INDEX (userId),
      FOREIGN KEY (labId) REFERENCES labs (id), FOREIGN KEY (userId) REFERENCES users (id))`);
    await runner.query(`CREATE TABLE sessions (id uuid NOT NULL PRIMARY KEY, userId uuid NOT NULL,
      refreshHash char(64) NOT NULL UNIQUE, previousHash char(64) NULL, rotatedAt datetime(3) NOT NULL,
      expiresAt datetime(3) NOT NULL, userAgent varchar(300) NOT NULL, createdAt ${stamp}, INDEX (userId),
      INDEX (previousHash), FOREIGN KEY (userId) REFERENCES users (id) ON DELETE CASCADE)`);
    await runner.query(`CREATE TABLE personal_tokens (id uuid NOT NULL PRIMARY KEY, userId uuid NOT NULL,
      name varchar(120) NOT NULL, hash char(64) NOT NULL UNIQUE, createdAt ${stamp}, lastUsedAt datetime(3) NULL,
      INDEX (userId), FOREIGN KEY (userId) REFERENCES users (id) ON DELETE CASCADE)`);
    await runner.query(`CREATE TABLE password_resets (id uuid NOT NULL PRIMARY KEY, userId uuid NOT NULL,
      hash char(64) NOT NULL UNIQUE, expiresAt datetime(3) NOT NULL, INDEX (userId),
      FOREIGN KEY (userId) REFERENCES users (id) ON DELETE CASCADE)`);
    await runner.query(`CREATE TABLE invitations (id uuid NOT NULL PRIMARY KEY, labId uuid NOT NULL,
      email varchar(254) NOT NULL, role varchar(20) NOT NULL, hash char(64) NOT NULL UNIQUE, invitedById uuid NOT NULL,
      createdAt ${stamp}, expiresAt datetime(3) NOT NULL, INDEX (labId),
      FOREIGN KEY (labId) REFERENCES labs (id) ON DELETE CASCADE)`);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of [
      'invitations',
      'password_resets',
      'personal_tokens',
      'sessions',
      'memberships',
      'labs',
      'users',
    ]) {
      await runner.query(`DROP TABLE ${table}`);
    }
  }
}
