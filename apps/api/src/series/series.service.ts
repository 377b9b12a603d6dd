import { HttpStatus, Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import {
  parseExperiment,
  parseSystem,
  toJcamp,
  varied,
  VARIED_UNITS,
  type Result,
  type Variation,
} from '@heddle/shared';
import { In, Repository } from 'typeorm';
import { PeopleService } from '../account/people.service.js';
import { page, type Paged, type PageQuery } from '../common/paging.js';
import { notFound, Problem, refusedFields } from '../common/problem.js';
import { requireMay, type LabContext } from '../policy/lab.guard.js';
import { ResultsService } from '../results/results.service.js';
import { RunEntity } from '../runs/run.entity.js';
import { RunsService } from '../runs/runs.service.js';
import { SystemsService } from '../systems/systems.service.js';
import type { NewSeriesDto, SeriesDto } from './series.dto.js';
import { SeriesEntity } from './series.entity.js';

@Injectable()
export class SeriesService {
  constructor(
    @InjectRepository(SeriesEntity) private readonly series: Repository<SeriesEntity>,
    @InjectRepository(RunEntity) private readonly runRows: Repository<RunEntity>,
    private readonly systems: SystemsService,
    private readonly runs: RunsService,
    private readonly results: ResultsService,
    private readonly people: PeopleService,
  ) {}

  async list(context: LabContext, query: PageQuery): Promise<Paged<SeriesDto>> {
    const rows = this.series.createQueryBuilder('series').where('series.labId = :labId', { labId: context.labId });
    const { items, nextCursor } = await page(rows, query, '-created', { created: 'series.createdAt' });
    const seen = await Promise.all(items.map((one) => this.toDto(context, one)));
    return { items: seen.filter((one) => one !== null), nextCursor };
  }

  /** Queues one run for each value; all documents are checked before the first is queued. */
  async create(context: LabContext, { name, systemId, revision, experiment, vary }: NewSeriesDto): Promise<SeriesDto> {
    const system = await this.systems.requireVisible(context, systemId);
    const document = parseSystem((await this.systems.requireRevision(systemId, revision)).document);
    const plan = parseExperiment(experiment);
    const pairs = vary.values.map((value, i) => {
      const pair = varied(document, plan, vary, value);
      if (!pair)
        throw refusedFields([{ path: 'vary.quantity', message: 'these documents have no such quantity to vary' }]);
      try {
        return { system: parseSystem(pair.system), experiment: parseExperiment(pair.experiment) };
      } catch (error) {
        throw refusedFields([
          { path: `vary.values[${i}]`, message: error instanceof Error ? error.message : String(error) },
        ]);
      }
    });
    const runIds: string[] = [];
    for (const pair of pairs) runIds.push((await this.runs.queue(context, { systemId, revision, ...pair })).run.id);
    const row = this.series.create({
      labId: context.labId,
      ownerId: context.userId,
      name,
      systemId: system.id,
      revision,
      vary,
      runIds,
    });
    return (await this.toDto(context, await this.series.save(row)))!;
  }

  async read(context: LabContext, id: string): Promise<SeriesDto> {
    const dto = await this.toDto(context, await this.require(context, id));
    if (!dto) throw notFound('series');
    return dto;
  }

  async remove(context: LabContext, id: string): Promise<void> {
    const row = await this.require(context, id);
    requireMay(context, 'run.steer', row.ownerId);
    await this.series.delete({ id });
  }

  /** All spectra as one table: ppm, then a column for each value. The first run's axis serves all. */
  async csv(context: LabContext, id: string): Promise<string> {
    const { vary, results } = await this.finished(context, id);
    const [{ spectrum }] = results;
    const count = spectrum.real.length;
    const heads = vary.values.map((value) => `${vary.quantity} ${value} ${VARIED_UNITS[vary.quantity]}`);
    const lines = [['ppm', ...heads].join(',')];
    for (let i = 0; i < count; i++) {
      const ppm = spectrum.firstPpm + (i * (spectrum.lastPpm - spectrum.firstPpm)) / (count - 1);
      lines.push([ppm, ...results.map((result) => result.spectrum.real[i] ?? '')].join(','));
    }
    return `${lines.join('\r\n')}\r\n`;
  }

  /** All spectra as blocks of one JCAMP-DX LINK file. */
  async jcamp(context: LabContext, id: string): Promise<string> {
    const { name, results } = await this.finished(context, id);
    const head = [`##TITLE= ${name}`, '##JCAMP-DX= 5.01', '##DATA TYPE= LINK', `##BLOCKS= ${results.length + 1}`];
    return `${head.join('\r\n')}\r\n${results.map((result) => toJcamp(result)).join('')}##END=\r\n`;
  }

  private async finished(
    context: LabContext,
    id: string,
  ): Promise<{ name: string; vary: Variation; results: Result[] }> {
    const { name, vary, runIds } = await this.require(context, id);
    const runs = await Promise.all(runIds.map((runId) => this.runs.requireVisible(context, runId)));
    if (runs.some(({ state }) => state !== 'done')) {
      throw new Problem(HttpStatus.CONFLICT, 'not-finished', 'Not all runs of this series are done yet.');
    }
    return { name, vary, results: await Promise.all(runs.map((run) => this.results.read(run))) };
  }

  private async require({ labId }: LabContext, id: string): Promise<SeriesEntity> {
    const row = await this.series.findOneBy({ id, labId });
    if (!row) throw notFound('series');
    return row;
  }

  /** Null for a series of a system that the asker may not see. */
  private async toDto(context: LabContext, row: SeriesEntity): Promise<SeriesDto | null> {
    const system = await this.systems.requireVisible(context, row.systemId).catch(() => null);
    if (!system) return null;
    const runs = await this.runs.toDtos(await this.runRows.findBy({ id: In(row.runIds) }));
    const named = await this.people.named([row.ownerId]);
    return {
      id: row.id,
      name: row.name,
      system: { id: system.id, name: system.name },
      revision: row.revision,
      owner: named(row.ownerId),
      vary: { ...row.vary, values: [...row.vary.values] },
      createdAt: row.createdAt.toISOString(),
      runs: row.runIds.flatMap((id) => runs.filter((run) => run.id === id)),
    };
  }
}
