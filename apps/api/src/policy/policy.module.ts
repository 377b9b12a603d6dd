import { Global, Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { Membership } from '../members/membership.entity.js';
import { LabGuard } from './lab.guard.js';

@Global()
@Module({
  imports: [TypeOrmModule.forFeature([Membership])],
  providers: [LabGuard],
  exports: [LabGuard, TypeOrmModule],
})
export class PolicyModule {}
