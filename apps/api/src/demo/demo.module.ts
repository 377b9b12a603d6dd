import { Module } from '@nestjs/common';
import { AccountModule } from '../account/account.module.js';
import { LabsModule } from '../labs/labs.module.js';
import { MembersModule } from '../members/members.module.js';
import { RunsModule } from '../runs/runs.module.js';
import { SeriesModule } from '../series/series.module.js';
import { SystemsModule } from '../systems/systems.module.js';
import { DemoService } from './demo.service.js';

@Module({
  imports: [AccountModule, LabsModule, MembersModule, SystemsModule, RunsModule, SeriesModule],
  providers: [DemoService],
})
export class DemoModule {}
