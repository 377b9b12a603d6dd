import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Inject, Injectable, Logger, type OnApplicationBootstrap } from '@nestjs/common';
import { InjectDataSource } from '@nestjs/typeorm';
import { DataSource } from 'typeorm';
import { AccountService } from '../account/account.service.js';
import { User } from '../account/user.entity.js';
import { newSecret } from '../common/ids.js';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { LabsService } from '../labs/labs.service.js';
import { MembersService } from '../members/members.service.js';
import type { LabContext } from '../policy/lab.guard.js';
import { ROLES, type Role } from '../policy/policy.js';
import { RunsService } from '../runs/runs.service.js';
import { SystemsService } from '../systems/systems.service.js';
import { SeriesService } from '../series/series.service.js';
import { DEMO_SERIES, DEMO_SYSTEMS } from './demo-documents.js';

const LAB = 'Saltmarsh Spin Laboratory';

const PEOPLE: Record<Role, string> = {
  chemist: 'Oda Brekke',
  instructor: 'Tomasz Wren',
  leader: 'Ilse Marchetti',
  admin: 'Rui Halloran',
};

/** Fills an empty database with a demonstration lab of invented people and compounds. Its runs go through the queue. */
@Injectable()
export class DemoService implements OnApplicationBootstrap {
  private readonly logger = new Logger('Demo');

  constructor(
    @Inject(SETTINGS) private readonly settings: Settings,
    @InjectDataSource() private readonly dataSource: DataSource,
    private readonly account: AccountService,
    private readonly labs: LabsService,
    private readonly members: MembersService,
    private readonly systems: SystemsService,
    private readonly runs: RunsService,
    private readonly series: SeriesService,
  ) {}

  async onApplicationBootstrap(): Promise<void> {
    if (!this.settings.demo || (await this.dataSource.manager.count(User)) > 0) return;
    const lab = await this.labs.create(LAB);
    const password = newSecret().slice(0, 20);
    const contexts = {} as Record<Role, LabContext>;
    for (const role of ROLES) {
      const user = await this.account.create(PEOPLE[role], `${role}@saltmarsh.example`, password);
      await this.members.add(lab.id, user.id, role);
      contexts[role] = { userId: user.id, labId: lab.id, role };
    }
    // For `npm start` to tell and for the tests; readable by the owner of the data folder only.
    writeFileSync(demoFile(this.settings), `${accountList(password)}\n`, { mode: 0o600 });
    for (const { owner, shared, note, system, experiments } of DEMO_SYSTEMS) {
      const document = { format: 'heddle.spin-system/1', ...system };
      const { id } = await this.systems.create(contexts[owner], { document, note, shared });
      for (const experiment of experiments) {
        const body = { systemId: id, revision: 1, experiment: { format: 'heddle.experiment/1', ...experiment } };
        await this.runs.create(contexts[owner], body);
      }
      for (const { of, experiment, ...rest } of DEMO_SERIES) {
        if (of !== system.name) continue;
        const body = {
          ...rest,
          systemId: id,
          revision: 1,
          experiment: { format: 'heddle.experiment/1', ...experiment },
        };
        await this.series.create(contexts[owner], body);
      }
    }
    this.logger.log(`made the demonstration lab with ${DEMO_SYSTEMS.length} systems`);
  }
}

/** The accounts of the demonstration lab, one a line: address and password. */
function accountList(password: string): string {
  return ROLES.map((role) => `${role}@saltmarsh.example  ${password}`).join('\n');
}

function demoFile({ dataFolder }: Settings): string {
  return join(dataFolder, 'demo-accounts');
}
