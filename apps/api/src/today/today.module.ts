import { Controller, Get, Injectable, Module, UseGuards } from '@nestjs/common';
import { ApiOkResponse, ApiParam, ApiProperty, ApiTags } from '@nestjs/swagger';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { RunDto, RunQuery } from '../runs/runs.dto.js';
import { RunsModule } from '../runs/runs.module.js';
import { RunsService } from '../runs/runs.service.js';
import { SystemDto, SystemQuery } from '../systems/systems.dto.js';
import { SystemsModule } from '../systems/systems.module.js';
import { SystemsService } from '../systems/systems.service.js';

class TodayDto {
  @ApiProperty({ type: [RunDto], description: 'runs of mine that failed and wait for a decision' }) waiting: RunDto[];
  @ApiProperty({ type: [RunDto], description: 'runs of the lab that are queued or running' }) running: RunDto[];
  @ApiProperty({ type: [SystemDto], description: 'systems touched last' }) recent: SystemDto[];
}

const FEW = 8;

@Injectable()
class TodayService {
  constructor(
    private readonly systems: SystemsService,
    private readonly runs: RunsService,
  ) {}

  async read(context: LabContext): Promise<TodayDto> {
    const runs = (query: Partial<RunQuery>) =>
      this.runs.list(context, Object.assign(new RunQuery(), { limit: FEW, ...query })).then(({ items }) => items);
    const [waiting, running, queued, recent] = await Promise.all([
      runs({ state: 'failed', owner: context.userId }),
      runs({ state: 'running' }),
      runs({ state: 'queued' }),
      this.systems.list(context, Object.assign(new SystemQuery(), { limit: FEW })),
    ]);
    return { waiting, running: [...running, ...queued].slice(0, FEW), recent: recent.items };
  }
}

@ApiTags('today')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/today')
class TodayController {
  constructor(private readonly today: TodayService) {}

  @Get()
  @Can('lab.read')
  @ApiOkResponse({ type: TodayDto })
  read(@InLab() context: LabContext): Promise<TodayDto> {
    return this.today.read(context);
  }
}

@Module({ imports: [SystemsModule, RunsModule], controllers: [TodayController], providers: [TodayService] })
export class TodayModule {}
