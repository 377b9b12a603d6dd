import { Controller, Get, Injectable, Module, Param, ParseUUIDPipe, StreamableFile, UseGuards } from '@nestjs/common';
import { ApiParam, ApiProduces, ApiTags } from '@nestjs/swagger';
import { AccountModule } from '../account/account.module.js';
import { PeopleService } from '../account/people.service.js';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { ResultsModule } from '../results/results.module.js';
import { ResultsService } from '../results/results.service.js';
import { RunsModule } from '../runs/runs.module.js';
import { RunsService } from '../runs/runs.service.js';
import { makeBrief } from './brief.js';
import { makePackage } from './run-package.js';

@Injectable()
class BriefsService {
  constructor(
    private readonly runs: RunsService,
    private readonly results: ResultsService,
    private readonly people: PeopleService,
  ) {}

  async brief(context: LabContext, id: string): Promise<{ name: string; bytes: Buffer }> {
    const { result, facts } = await this.gather(context, id);
    return { name: result.system.name, bytes: await makeBrief(result, facts) };
  }

  async package(context: LabContext, id: string): Promise<{ name: string; bytes: Uint8Array }> {
    const { result, facts } = await this.gather(context, id);
    return makePackage(result, { ...facts, runId: id, brief: await makeBrief(result, facts) });
  }

  private async gather(context: LabContext, id: string) {
    const run = await this.runs.requireVisible(context, id);
    const result = await this.results.read(run);
    const named = await this.people.named([run.ownerId]);
    const facts = { revision: run.revision, author: named(run.ownerId).name, date: run.finishedAt ?? run.createdAt };
    return { result, facts };
  }
}

@ApiTags('briefs')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/runs/:id')
class BriefsController {
  constructor(private readonly briefs: BriefsService) {}

  @Get('brief.pdf')
  @Can('run.list')
  @ApiProduces('application/pdf')
  async brief(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    const { name, bytes } = await this.briefs.brief(context, id);
    return attachment(bytes, `${name} brief.pdf`, 'application/pdf');
  }

  @Get('package.eln')
  @Can('run.list')
  @ApiProduces('application/vnd.eln+zip')
  async package(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<StreamableFile> {
    const { name, bytes } = await this.briefs.package(context, id);
    return attachment(bytes, `${name}.eln`, 'application/vnd.eln+zip');
  }
}

function attachment(bytes: Uint8Array, name: string, type: string): StreamableFile {
  const safe = name.replace(/[^A-Za-z0-9 ._-]+/g, '-');
  return new StreamableFile(bytes, { type, disposition: `attachment; filename="${safe}"` });
}

@Module({
  imports: [RunsModule, ResultsModule, AccountModule],
  controllers: [BriefsController],
  providers: [BriefsService],
})
export class BriefsModule {}
