import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { Lab } from './lab.entity.js';
import { LabsController } from './labs.controller.js';
import { LabsService } from './labs.service.js';

@Module({
  imports: [TypeOrmModule.forFeature([Lab])],
  controllers: [LabsController],
  providers: [LabsService],
  exports: [LabsService],
})
export class LabsModule {}
