import { createHash } from 'node:crypto';
import { HttpStatus, Injectable } from '@nestjs/common';
import { InjectDataSource, InjectRepository } from '@nestjs/typeorm';
import {
  ENGINE_VERSION,
  estimateCost,
  parseExperiment,
  parseSystem,
  requirePair,
  type Experiment,
  type SpinSystem,
} from '@heddle/shared';
import { DataSource, Repository, type SelectQueryBuilder } from 'typeorm';
import { PeopleService } from '../account/people.service.js';
import { page, type Paged } from '../common/paging.js';
import { notFound, Problem } from '../common/problem.js';
import { JobsService } from '../jobs/jobs.service.js';
import { WorkerPool } from '../jobs/worker-pool.js';
import { requireMay, type LabContext } from '../policy/lab.guard.js';
import { ResultsService } from '../results/results.service.js';
import { SystemEntity } from '../systems/system.entity.js';
import { SystemsService } from '../systems/systems.service.js';
import { RunEntity } from './run.entity.js';
import {
  RUN_SORT,
  type EstimateDto,
  type EstimateRequestDto,
  type NewRunDto,
  type RunDto,
  type RunQuery,
  type WorkersDto,
} from './runs.dto.js';

/** Runs estimated below this have a thread of their own beside the others. */
const SHORT_SECONDS = 2;

const wrongState = (detail: string) => new Problem(HttpStatus.CONFLICT, 'wrong-state', detail);

/** What is to be run. `system` is the revision's document, or that with one value varied. */
export interface RunOrder {
  systemId: string;
  revision: number;
  system: SpinSystem;
  experiment: Experiment;
}

@Injectable()
export class RunsService {
  constructor(
    @InjectDataSource() private readonly dataSource: DataSource,
    @InjectRepository(RunEntity) private readonly runs: Repository<RunEntity>,
    private readonly systems: SystemsService,
    private readonly results: ResultsService,
    private readonly jobs: JobsService,
    private readonly pool: WorkerPool,
    private readonly people: PeopleService,
  ) {}

  async list(context: LabContext, query: RunQuery): Promise<Paged<RunDto>> {
    const rows = this.visible(context);
    if (query.state) rows.andWhere('run.state = :state', { state: query.state });
    if (query.system) rows.andWhere('run.systemId = :system', { system: query.system });
    if (query.owner) rows.andWhere('run.ownerId = :owner', { owner: query.owner });
    const { items, nextCursor } = await page(rows, query, query.sort, RUN_SORT);
    return { items: await this.toDtos(items), nextCursor };
  }

  /**
   * Queues a run, or offers the one with the same revision, experiment and engine. `key` is the caller's Idempotency-Key:
   * the same call twice makes one run.
   */
  async create(context: LabContext, body: NewRunDto, key?: string): Promise<RunDto> {
    const { systemId, revision } = await this.revisionOf(context, body);
    await this.systems.requireVisible(context, systemId);
    const system = parseSystem((await this.systems.requireRevision(systemId, revision)).document);
    const experiment = parseExperiment(body.experiment);
    const { run, identical } = await this.queue(context, { systemId, revision, system, experiment }, key);
    const dto = await this.toDto(run);
    return identical ? { ...dto, identical } : dto;
  }

  /** The revision that a request names, or that of the system it brings along. */
  private async revisionOf(context: LabContext, body: NewRunDto): Promise<{ systemId: string; revision: number }> {
    if (!body.system) return { systemId: body.systemId!, revision: body.revision! };
    requirePair(parseSystem(body.system), parseExperiment(body.experiment));
    const { id } = await this.systems.create(context, { document: body.system });
    return { systemId: id, revision: 1 };
  }

  /** Queues a pair of documents that stands on a revision, which the asker was found to see. */
  async queue(context: LabContext, order: RunOrder, key?: string): Promise<{ run: RunEntity; identical: boolean }> {
    const { labId, userId } = context;
    const { systemId, revision, system, experiment } = order;
    requirePair(system, experiment);
    const requestKey = key ? `${userId}:${hash(key)}` : null;
    const identity = hash(JSON.stringify([systemId, revision, system, experiment, ENGINE_VERSION]));
    const offered = await this.findSame(labId, identity, requestKey);
    if (offered) return { run: offered, identical: true };
    const { id } = await this.runs.save(
      this.runs.create({
        labId,
        ownerId: userId,
        systemId,
        revision,
        systemName: system.name,
        system,
        experiment,
        engine: ENGINE_VERSION,
        identity,
        requestKey,
        short: estimateCost(system, experiment).seconds < SHORT_SECONDS,
      }),
    );
    this.jobs.wake();
    return { run: await this.runs.findOneByOrFail({ id }), identical: false };
  }

  async read(context: LabContext, id: string): Promise<RunDto> {
    return this.toDto(await this.requireVisible(context, id));
  }

  async cancel(context: LabContext, id: string): Promise<RunDto> {
    const run = await this.requireVisible(context, id);
    requireMay(context, 'run.steer', run.ownerId);
    if (!(await this.jobs.move(id, 'cancelled', { finishedAt: new Date() }))) {
      throw wrongState('Only a run that waits or is running can be cancelled.');
    }
    this.jobs.stop(id);
    return this.read(context, id);
  }

  async requeue(context: LabContext, id: string): Promise<RunDto> {
    const run = await this.requireVisible(context, id);
    requireMay(context, 'run.steer', run.ownerId);
    const again = { progress: 0, attempts: 0, error: null, finishedAt: null, startedAt: null, lease: null };
    if (run.state === 'running' || !(await this.jobs.move(id, 'queued', again))) {
      throw wrongState('Only a run that failed or was cancelled can be queued again.');
    }
    this.jobs.wake();
    return this.read(context, id);
  }

  /** Deletes a run that nothing waits for, with its result. */
  async remove(context: LabContext, id: string): Promise<void> {
    const run = await this.requireVisible(context, id);
    requireMay(context, 'run.steer', run.ownerId);
    if (run.state === 'queued' || run.state === 'running') throw wrongState('Cancel the run first.');
    await this.dataSource.transaction(async (manager) => {
      await this.results.remove(manager, id);
      await manager.delete(RunEntity, { id });
    });
  }

  /** The cost of a run before it is made; refused like the run itself would be. */
  estimate({ system, experiment }: EstimateRequestDto): EstimateDto {
    const [parsedSystem, parsedExperiment] = [parseSystem(system), parseExperiment(experiment)];
    requirePair(parsedSystem, parsedExperiment);
    return estimateCost(parsedSystem, parsedExperiment);
  }

  async workers({ labId }: LabContext): Promise<WorkersDto> {
    const [queued, running] = await Promise.all([
      this.runs.countBy({ labId, state: 'queued' }),
      this.runs.countBy({ labId, state: 'running' }),
    ]);
    return { threads: this.pool.threads, busy: this.pool.busy, queued, running };
  }

  /** A run of a system the asker may see, or of their own; else 404. */
  async requireVisible(context: LabContext, id: string): Promise<RunEntity> {
    const run = await this.visible(context).andWhere('run.id = :id', { id }).getOne();
    if (!run) throw notFound('run');
    return run;
  }

  async toDtos(runs: readonly RunEntity[]): Promise<RunDto[]> {
    const named = await this.people.named(runs.map(({ ownerId }) => ownerId));
    return runs.map((run) => ({
      id: run.id,
      state: run.state,
      progress: run.progress,
      system: { id: run.systemId, name: run.systemName },
      revision: run.revision,
      experiment: { ...run.experiment },
      engine: run.engine,
      owner: named(run.ownerId),
      createdAt: run.createdAt.toISOString(),
      startedAt: run.startedAt?.toISOString() ?? null,
      finishedAt: run.finishedAt?.toISOString() ?? null,
      seconds: run.seconds,
      method: run.method,
      warnings: run.warnings,
      error: run.error,
    }));
  }

  private async toDto(run: RunEntity): Promise<RunDto> {
    return (await this.toDtos([run]))[0];
  }

  private visible({ labId, userId }: LabContext): SelectQueryBuilder<RunEntity> {
    return this.runs
      .createQueryBuilder('run')
      .innerJoin(SystemEntity, 'system', 'system.id = run.systemId')
      .where('run.labId = :labId', { labId })
      .andWhere('(run.ownerId = :userId OR system.ownerId = :userId OR system.shared = TRUE)', { userId });
  }

  private async findSame(labId: string, identity: string, requestKey: string | null): Promise<RunEntity | null> {
    const repeated = requestKey ? await this.runs.findOneBy({ requestKey }) : null;
    if (repeated) return repeated;
    return this.runs
      .createQueryBuilder('run')
      .where("run.labId = :labId AND run.identity = :identity AND run.state IN ('done', 'queued', 'running')", {
        labId,
        identity,
      })
      .orderBy('run.createdAt', 'DESC')
      .getOne();
  }
}

function hash(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}
