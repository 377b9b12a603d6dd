import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { AccountModule } from '../account/account.module.js';
import { JobsModule } from '../jobs/jobs.module.js';
import { ResultsModule } from '../results/results.module.js';
import { SystemsModule } from '../systems/systems.module.js';
import { RunEntity } from './run.entity.js';
import { RunsController } from './runs.controller.js';
import { RunsService } from './runs.service.js';

@Module({
  imports: [TypeOrmModule.forFeature([RunEntity]), AccountModule, JobsModule, ResultsModule, SystemsModule],
  controllers: [RunsController],
  providers: [RunsService],
  exports: [RunsService],
})
export class RunsModule {}
