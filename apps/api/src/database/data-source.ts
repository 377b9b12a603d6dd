import 'reflect-metadata';
import { DataSource, type DataSourceOptions } from 'typeorm';
import { Session } from '../auth/session.entity.js';
import { PasswordReset } from '../auth/password-reset.entity.js';
import { PersonalToken } from '../account/personal-token.entity.js';
import { User } from '../account/user.entity.js';
import { Invitation } from '../invitations/invitation.entity.js';
import { Lab } from '../labs/lab.entity.js';
import { Membership } from '../members/membership.entity.js';
import { ResultEntity } from '../results/result.entity.js';
import { RunEntity } from '../runs/run.entity.js';
import { SeriesEntity } from '../series/series.entity.js';
import { RevisionEntity } from '../systems/revision.entity.js';
import { SystemEntity } from '../systems/system.entity.js';
import { Bench1764560100000 } from './migrations/1764560100000-bench.js';
import { ShortRuns1764560300000 } from './migrations/1764560300000-short-runs.js';
import { Series1764560200000 } from './migrations/1764560200000-series.js';
import { People1764560000000 } from './migrations/1764560000000-people.js';

export function dataSourceOptions(url: string): DataSourceOptions {
  return {
    type: 'mariadb',
    url,
    entities: [
      User,
      Lab,
      Membership,
      Session,
      PersonalToken,
      PasswordReset,
      Invitation,
      SystemEntity,
      RevisionEntity,
      RunEntity,
      ResultEntity,
      SeriesEntity,
    ],
    migrations: [People1764560000000, Bench1764560100000, Series1764560200000, ShortRuns1764560300000],
    migrationsRun: true,
    synchronize: false,
    timezone: 'Z',
    charset: 'utf8mb4',
    poolSize: 10,
  };
}

/** For TypeORM's command line. */
export default new DataSource(dataSourceOptions(process.env.DATABASE_URL ?? 'mysql://localhost/heddle'));
