import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { ResultsModule } from '../results/results.module.js';
import { RunEntity } from '../runs/run.entity.js';
import { JobsService } from './jobs.service.js';
import { WorkerPool } from './worker-pool.js';

@Module({
  imports: [TypeOrmModule.forFeature([RunEntity]), ResultsModule],
  providers: [JobsService, WorkerPool],
  exports: [JobsService, WorkerPool],
})
export class JobsModule {}
