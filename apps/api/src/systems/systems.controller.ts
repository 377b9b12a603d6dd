import {
  Body,
  Controller,
  Delete,
  Get,
  Param,
  ParseIntPipe,
  ParseUUIDPipe,
  Patch,
  Post,
  Query,
  UseGuards,
} from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiParam, ApiTags } from '@nestjs/swagger';
import { NoContent } from '../common/decorators.js';
import { PageQuery } from '../common/paging.js';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import {
  NewRevisionDto,
  NewSystemDto,
  RevisionDto,
  RevisionPageDto,
  SystemChangeDto,
  SystemDto,
  SystemPageDto,
  SystemQuery,
} from './systems.dto.js';
import { SystemsService } from './systems.service.js';

@ApiTags('systems')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/systems')
export class SystemsController {
  constructor(private readonly systems: SystemsService) {}

  @Get()
  @Can('system.list')
  @ApiOkResponse({ type: SystemPageDto })
  list(@InLab() context: LabContext, @Query() query: SystemQuery): Promise<SystemPageDto> {
    return this.systems.list(context, query);
  }

  @Post()
  @Can('system.create')
  @ApiCreatedResponse({ type: SystemDto })
  create(@InLab() context: LabContext, @Body() body: NewSystemDto): Promise<SystemDto> {
    return this.systems.create(context, body);
  }

  @Get(':id')
  @Can('system.list')
  @ApiOkResponse({ type: SystemDto })
  read(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<SystemDto> {
    return this.systems.read(context, id);
  }

  @Patch(':id')
  @Can('system.list')
  @ApiOkResponse({ type: SystemDto })
  change(
    @InLab() context: LabContext,
    @Param('id', ParseUUIDPipe) id: string,
    @Body() body: SystemChangeDto,
  ): Promise<SystemDto> {
    return this.systems.change(context, id, body);
  }

  @Delete(':id')
  @Can('system.delete')
  @NoContent()
  remove(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<void> {
    return this.systems.remove(context, id);
  }

  @Post(':id/duplicate')
  @Can('system.create')
  @ApiCreatedResponse({ type: SystemDto })
  duplicate(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<SystemDto> {
    return this.systems.duplicate(context, id);
  }

  @Get(':id/revisions')
  @Can('system.list')
  @ApiOkResponse({ type: RevisionPageDto })
  listRevisions(
    @InLab() context: LabContext,
    @Param('id', ParseUUIDPipe) id: string,
    @Query() query: PageQuery,
  ): Promise<RevisionPageDto> {
    return this.systems.listRevisions(context, id, query);
  }

  @Post(':id/revisions')
  @Can('system.edit')
  @ApiCreatedResponse({ type: RevisionDto })
  saveRevision(
    @InLab() context: LabContext,
    @Param('id', ParseUUIDPipe) id: string,
    @Body() body: NewRevisionDto,
  ): Promise<RevisionDto> {
    return this.systems.saveRevision(context, id, body);
  }

  @Get(':id/revisions/:number')
  @Can('system.list')
  @ApiOkResponse({ type: RevisionDto })
  readRevision(
    @InLab() context: LabContext,
    @Param('id', ParseUUIDPipe) id: string,
    @Param('number', ParseIntPipe) number: number,
  ): Promise<RevisionDto> {
    return this.systems.readRevision(context, id, number);
  }
}
