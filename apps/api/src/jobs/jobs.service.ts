import { randomUUID } from 'node:crypto';
import { Inject, Injectable, Logger, type OnApplicationBootstrap, type OnApplicationShutdown } from '@nestjs/common';
import { InjectDataSource, InjectRepository } from '@nestjs/typeorm';
import { DataSource, In, LessThan, Repository } from 'typeorm';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { EventsService } from '../events/events.service.js';
import { ResultsService } from '../results/results.service.js';
import { RunEntity } from '../runs/run.entity.js';
import { statesBefore, type RunState } from '../runs/run.states.js';
import type { SimulateReply } from './simulate.messages.js';
import { WorkerPool } from './worker-pool.js';

/** A worker's hold on a run lasts this long unless renewed; it is renewed three times as often. */
const LEASE_MS = 30_000;
/** How often the queue is looked at when nothing wakes it. */
const LOOK_MS = 2_000;
/** A run whose worker is lost this often has failed. */
const MOST_ATTEMPTS = 3;

/**
 * Takes queued runs from the database and simulates them on the pool. Every change of state is one statement that checks
 * the old state, so that two processes never both win; the database is the only truth, and a lost process loses nothing.
 */
@Injectable()
export class JobsService implements OnApplicationBootstrap, OnApplicationShutdown {
  private readonly logger = new Logger('Jobs');
  private readonly running = new Map<string, { lease: string; abort: AbortController; settled: Promise<void> }>();
  private timer: NodeJS.Timeout | undefined;
  private stopped = false;
  private looking: Promise<void> | undefined;

  constructor(
    @InjectDataSource() private readonly dataSource: DataSource,
    @InjectRepository(RunEntity) private readonly runs: Repository<RunEntity>,
    @Inject(SETTINGS) private readonly settings: Settings,
    private readonly results: ResultsService,
    private readonly pool: WorkerPool,
    private readonly events: EventsService,
  ) {}

  onApplicationBootstrap(): void {
    this.timer = setInterval(() => void this.look(), LOOK_MS);
    this.wake();
  }

  async onApplicationShutdown(): Promise<void> {
    this.stopped = true;
    clearInterval(this.timer);
    await this.looking;
    const open = [...this.running.values()];
    for (const { abort } of open) abort.abort();
    await Promise.allSettled(open.map(({ settled }) => settled));
  }

  /** Something was queued or a thread is free: look at the queue now. */
  wake(): void {
    void this.look();
  }

  /** Stops a run that this process is computing; its state has been changed already. */
  stop(runId: string): void {
    this.running.get(runId)?.abort.abort();
  }

  /** Moves a run to `to` if its state allows it; false when somebody else was first. */
  async move(runId: string, to: RunState, values: Partial<RunEntity> = {}): Promise<boolean> {
    const moved = await this.runs.update({ id: runId, state: In(statesBefore(to)) }, { ...values, state: to });
    if (moved.affected === 1) await this.announce(runId);
    return moved.affected === 1;
  }

  private look(): Promise<void> {
    this.looking ??= this.takeWork()
      .catch((error: unknown) => this.logger.error(`the queue could not be read: ${String(error)}`))
      .finally(() => (this.looking = undefined));
    return this.looking;
  }

  private async takeWork(): Promise<void> {
    await this.renewLeases();
    await this.requeueLost();
    while (!this.stopped && this.running.size < this.settings.workers) {
      const run = await this.claim(false);
      if (!run) return;
      this.start(run);
    }
    // One thread more for short runs, which so never wait behind long ones.
    if (!this.stopped && this.running.size === this.settings.workers) {
      const run = await this.claim(true);
      if (run) this.start(run);
    }
  }

  /** Claims the oldest queued run in one statement, short ones first; only a short one if asked so. */
  private async claim(onlyShort: boolean): Promise<RunEntity | null> {
    const lease = randomUUID();
    await this.dataSource.query(
      `UPDATE runs SET state = 'running', lease = ?, leaseUntil = ?, startedAt = ?, progress = 0, attempts = attempts + 1
       WHERE state = 'queued' AND short >= ? ORDER BY short DESC, createdAt, id LIMIT 1`,
      [lease, new Date(Date.now() + LEASE_MS), new Date(), onlyShort],
    );
    return this.runs.findOneBy({ lease, state: 'running' });
  }

  private start(run: RunEntity): void {
    const abort = new AbortController();
    const settled = this.compute(run, abort.signal)
      .catch((error: unknown) =>
        this.logger.error(`run ${run.id}: ${error instanceof Error ? error.stack : String(error)}`),
      )
      .finally(() => {
        this.running.delete(run.id);
        if (!this.stopped) this.wake();
      });
    this.running.set(run.id, { lease: run.lease!, abort, settled });
    void this.announce(run.id);
  }

  private async compute(run: RunEntity, signal: AbortSignal): Promise<void> {
    const onProgress = (progress: number) => {
      this.publish(run, 'running', progress);
      void this.runs.update({ id: run.id, lease: run.lease!, state: 'running' }, { progress });
    };
    try {
      const reply = await this.pool.simulate(run.system, run.experiment, onProgress, signal);
      await this.finish(run, reply);
    } catch (error) {
      if (signal.aborted) {
        // Cancelled already, or this process stops: then somebody else shall compute it.
        if (this.stopped) await this.release(run);
        return;
      }
      await this.move(run.id, 'failed', {
        finishedAt: new Date(),
        error: `the worker broke off: ${String(error)}`.slice(0, 2000),
      });
    }
  }

  private async finish(run: RunEntity, reply: SimulateReply): Promise<void> {
    const finishedAt = new Date();
    if (reply.kind === 'refused') {
      await this.move(run.id, 'failed', { finishedAt, error: reply.message.slice(0, 2000) });
      return;
    }
    if (reply.kind !== 'done') throw new Error('a part of a run is no result');
    const { report } = reply.result;
    const warnings =
      report.warnings.length + report.approximations.filter(({ hz, warnAbove }) => hz > warnAbove).length;
    await this.dataSource.transaction(async (manager) => {
      const done = await manager.update(
        RunEntity,
        { id: run.id, state: 'running', lease: run.lease! },
        {
          state: 'done',
          progress: 1,
          finishedAt,
          seconds: report.seconds,
          method: report.method.slice(0, 300),
          warnings,
          error: null,
        },
      );
      if (done.affected !== 1) return;
      const { system, experiment } = run;
      await this.results.store(manager, run.id, { format: 'heddle.result/1', system, experiment, ...reply.result });
    });
    await this.announce(run.id);
  }

  private async release(run: RunEntity): Promise<void> {
    await this.runs.update({ id: run.id, state: 'running', lease: run.lease! }, { state: 'queued', lease: null });
  }

  private async renewLeases(): Promise<void> {
    const leases = [...this.running.values()].map(({ lease }) => lease);
    if (leases.length === 0) return;
    await this.runs.update({ lease: In(leases), state: 'running' }, { leaseUntil: new Date(Date.now() + LEASE_MS) });
  }

  /** Runs whose worker has gone silent go back into the queue, or fail when that has happened too often. */
  private async requeueLost(): Promise<void> {
    const lost = await this.runs.findBy({ state: 'running', leaseUntil: LessThan(new Date()) });
    for (const { id, attempts, lease } of lost) {
      if (this.running.has(id)) continue;
      const values: Partial<RunEntity> =
        attempts >= MOST_ATTEMPTS
          ? { state: 'failed', finishedAt: new Date(), error: `its worker was lost ${attempts} times` }
          : { state: 'queued', lease: null };
      const moved = await this.runs.update({ id, state: 'running', lease: lease! }, values);
      if (moved.affected === 1) await this.announce(id);
    }
  }

  private async announce(runId: string): Promise<void> {
    const run = await this.runs.findOneBy({ id: runId });
    if (run) this.publish(run, run.state, run.progress);
  }

  private publish({ id, labId }: RunEntity, state: RunState, progress: number): void {
    this.events.publish({ labId, type: 'run', data: { id, state, progress } });
  }
}
