import {
  Body,
  Controller,
  Delete,
  Get,
  Header,
  Headers,
  HttpCode,
  Param,
  ParseUUIDPipe,
  Post,
  Query,
  Res,
  StreamableFile,
  UseGuards,
} from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiParam, ApiProduces, ApiTags } from '@nestjs/swagger';
import { toCsv, toJcamp } from '@heddle/shared';
import type { Response } from 'express';
import { NoContent } from '../common/decorators.js';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { ResultsService } from '../results/results.service.js';
import { EstimateDto, EstimateRequestDto, NewRunDto, RunDto, RunPageDto, RunQuery, WorkersDto } from './runs.dto.js';
import { RunsService } from './runs.service.js';

/** Results never change once they are there. */
const FOREVER = 'private, max-age=31536000, immutable';

@ApiTags('runs')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId')
export class RunsController {
  constructor(
    private readonly runs: RunsService,
    private readonly results: ResultsService,
  ) {}

  @Get('runs')
  @Can('run.list')
  @ApiOkResponse({ type: RunPageDto })
  list(@InLab() context: LabContext, @Query() query: RunQuery): Promise<RunPageDto> {
    return this.runs.list(context, query);
  }

  @Post('runs')
  @Can('run.create')
  @ApiCreatedResponse({ type: RunDto })
  async create(
    @InLab() context: LabContext,
    @Body() body: NewRunDto,
    @Headers('idempotency-key') key: string | undefined,
    @Res({ passthrough: true }) response: Response,
  ): Promise<RunDto> {
    const run = await this.runs.create(context, body, key);
    response.status(run.identical ? 200 : 201);
    return run;
  }

  @Post('estimate')
  @HttpCode(200)
  @Can('run.create')
  @ApiOkResponse({ type: EstimateDto })
  estimate(@Body() body: EstimateRequestDto): EstimateDto {
    return this.runs.estimate(body);
  }

  @Get('workers')
  @Can('worker.list')
  @ApiOkResponse({ type: WorkersDto })
  workers(@InLab() context: LabContext): Promise<WorkersDto> {
    return this.runs.workers(context);
  }

  @Get('runs/:id')
  @Can('run.list')
  @ApiOkResponse({ type: RunDto })
  read(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<RunDto> {
    return this.runs.read(context, id);
  }

  @Delete('runs/:id')
  @Can('run.steer')
  @NoContent()
  remove(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<void> {
    return this.runs.remove(context, id);
  }

  @Post('runs/:id/cancel')
  @HttpCode(200)
  @Can('run.steer')
  @ApiOkResponse({ type: RunDto })
  cancel(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<RunDto> {
    return this.runs.cancel(context, id);
  }

  @Post('runs/:id/requeue')
  @HttpCode(200)
  @Can('run.steer')
  @ApiOkResponse({ type: RunDto })
  requeue(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<RunDto> {
    return this.runs.requeue(context, id);
  }

  @Get('runs/:id/result')
  @Can('run.list')
  @Header('cache-control', FOREVER)
  @ApiOkResponse({ description: 'heddle.result/1', schema: { type: 'object', additionalProperties: true } })
  async result(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<object> {
    return this.results.readDocument(await this.runs.requireVisible(context, id));
  }

  @Get('runs/:id/result.jdx')
  @Can('run.list')
  @ApiProduces('chemical/x-jcamp-dx')
  async jcamp(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    const result = await this.results.read(await this.runs.requireVisible(context, id));
    return download(toJcamp(result), result.system.name, 'jdx', 'chemical/x-jcamp-dx');
  }

  @Get('runs/:id/result.csv')
  @Can('run.list')
  @ApiProduces('text/csv')
  async csv(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    const result = await this.results.read(await this.runs.requireVisible(context, id));
    return download(toCsv(result), result.system.name, 'csv', 'text/csv; charset=utf-8');
  }

  @Get('runs/:id/arrays')
  @Can('run.list')
  @Header('cache-control', FOREVER)
  @ApiProduces('application/octet-stream')
  async arrays(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    return new StreamableFile(await this.results.readBinary(await this.runs.requireVisible(context, id)));
  }
}

function download(text: string, name: string, ending: string, type: string): StreamableFile {
  const safe = name.replace(/[^A-Za-z0-9._-]+/g, '-').replace(/^-+|-+$/g, '') || 'spectrum';
  return new StreamableFile(Buffer.from(text), { type, disposition: `attachment; filename="${safe}.${ending}"` });
}
