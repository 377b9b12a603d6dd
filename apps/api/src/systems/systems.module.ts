import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { AccountModule } from '../account/account.module.js';
import { RevisionEntity } from './revision.entity.js';
import { SystemEntity } from './system.entity.js';
import { SystemsController } from './systems.controller.js';
import { SystemsService } from './systems.service.js';

@Module({
  imports: [TypeOrmModule.forFeature([SystemEntity, RevisionEntity]), AccountModule],
  controllers: [SystemsController],
  providers: [SystemsService],
  exports: [SystemsService],
})
export class SystemsModule {}
