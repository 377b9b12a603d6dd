import { Body, Controller, Get, Patch, UseGuards } from '@nestjs/common';
import { ApiOkResponse, ApiParam, ApiTags } from '@nestjs/swagger';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { LabChangeDto, LabDto } from './labs.dto.js';
import { LabsService } from './labs.service.js';

@ApiTags('labs')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId')
export class LabsController {
  constructor(private readonly labs: LabsService) {}

  @Get()
  @Can('lab.read')
  @ApiOkResponse({ type: LabDto })
  read(@InLab() context: LabContext): Promise<LabDto> {
    return this.labs.read(context);
  }

  @Patch()
  @Can('lab.edit')
  @ApiOkResponse({ type: LabDto })
  rename(@InLab() context: LabContext, @Body() change: LabChangeDto): Promise<LabDto> {
    return this.labs.rename(context, change);
  }
}
