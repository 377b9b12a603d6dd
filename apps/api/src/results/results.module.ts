import { Module } from '@nestjs/common';
import { TypeOrmModule } from '@nestjs/typeorm';
import { ResultEntity } from './result.entity.js';
import { ResultsService } from './results.service.js';

@Module({ imports: [TypeOrmModule.forFeature([ResultEntity])], providers: [ResultsService], exports: [ResultsService] })
export class ResultsModule {}
