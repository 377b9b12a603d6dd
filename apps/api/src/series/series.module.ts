import {
  Body,
  Controller,
  Delete,
  Get,
  Module,
  Param,
  ParseUUIDPipe,
  Post,
  Query,
  StreamableFile,
  UseGuards,
} from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiParam, ApiProduces, ApiTags } from '@nestjs/swagger';
import { TypeOrmModule } from '@nestjs/typeorm';
import { AccountModule } from '../account/account.module.js';
import { NoContent } from '../common/decorators.js';
import { PageQuery } from '../common/paging.js';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { ResultsModule } from '../results/results.module.js';
import { RunEntity } from '../runs/run.entity.js';
import { RunsModule } from '../runs/runs.module.js';
import { SystemsModule } from '../systems/systems.module.js';
import { NewSeriesDto, SeriesDto, SeriesPageDto } from './series.dto.js';
import { SeriesEntity } from './series.entity.js';
import { SeriesService } from './series.service.js';

@ApiTags('series')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/series')
class SeriesController {
  constructor(private readonly series: SeriesService) {}

  @Get()
  @Can('run.list')
  @ApiOkResponse({ type: SeriesPageDto })
  list(@InLab() context: LabContext, @Query() query: PageQuery): Promise<SeriesPageDto> {
    return this.series.list(context, query);
  }

  @Post()
  @Can('run.create')
  @ApiCreatedResponse({ type: SeriesDto })
  create(@InLab() context: LabContext, @Body() body: NewSeriesDto): Promise<SeriesDto> {
    return this.series.create(context, body);
  }

  @Get(':id')
  @Can('run.list')
  @ApiOkResponse({ type: SeriesDto })
  read(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<SeriesDto> {
    return this.series.read(context, id);
  }

  @Delete(':id')
  @Can('run.steer')
  @NoContent()
  remove(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<void> {
    return this.series.remove(context, id);
  }

  @Get(':id/series.csv')
  @Can('run.list')
  @ApiProduces('text/csv')
  async csv(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    return asFile(await this.series.csv(context, id), 'series.csv', 'text/csv; charset=utf-8');
  }

  @Get(':id/series.jdx')
  @Can('run.list')
  @ApiProduces('chemical/x-jcamp-dx')
  async jcamp(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    return asFile(await this.series.jcamp(context, id), 'series.jdx', 'chemical/x-jcamp-dx');
  }
}

function asFile(text: string, name: string, type: string): StreamableFile {
  return new StreamableFile(Buffer.from(text), { type, disposition: `attachment; filename="${name}"` });
}

@Module({
  imports: [
    TypeOrmModule.forFeature([SeriesEntity, RunEntity]),
    AccountModule,
    SystemsModule,
    RunsModule,
    ResultsModule,
  ],
  controllers: [SeriesController],
  providers: [SeriesService],
  exports: [SeriesService],
})
export class SeriesModule {}
