import { MessageChannel } from 'node:worker_threads';
import { Inject, Injectable, type OnModuleDestroy } from '@nestjs/common';
import { estimateCost, mergeParts, planParts, toResult, type Experiment, type SpinSystem } from '@heddle/shared';
import { Piscina } from 'piscina';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import type { SimulateReply, SimulateTask } from './simulate.messages.js';
import { workerFile } from './worker-file.js';

/** Runs estimated below this stay in one thread, s. */
const WORTH_CUTTING = 0.5;

/** Worker threads that simulate, one run or part each at a time. */
@Injectable()
export class WorkerPool implements OnModuleDestroy {
  readonly threads: number;
  private readonly pool: Piscina<SimulateTask, SimulateReply>;
  private active = 0;

  constructor(@Inject(SETTINGS) private readonly settings: Settings) {
    this.threads = settings.workers;
    this.pool = new Piscina({ ...workerFile(), minThreads: 0, maxThreads: settings.workers + 1, idleTimeout: 60_000 });
  }

  get busy(): number {
    return this.active;
  }

  /**
   * Simulates in a thread; an oriented sample in as many parts as there are threads, merged exactly. Rejects with an
   * AbortError as soon as `signal` fires, and ends the threads.
   */
  async simulate(
    system: SpinSystem,
    experiment: Experiment,
    onProgress: (fraction: number) => void,
    signal: AbortSignal,
  ): Promise<SimulateReply> {
    const parts = this.partsOf(system, experiment);
    if (parts < 2) return this.ask({ system, experiment }, onProgress, signal);
    const started = Date.now();
    const fractions = new Array<number>(parts).fill(0);
    const replies = await Promise.all(
      fractions.map((_, index) =>
        this.ask(
          { system, experiment, part: { index, of: parts } },
          (fraction) => {
            fractions[index] = fraction;
            onProgress(fractions.reduce((sum, one) => sum + one, 0) / parts);
          },
          signal,
        ),
      ),
    );
    const refused = replies.find((reply) => reply.kind === 'refused');
    if (refused) return refused;
    const signals = replies.flatMap((reply) => (reply.kind === 'part' ? [reply.signal] : []));
    const solved = mergeParts(system, experiment, signals);
    return { kind: 'done', result: toResult(system, experiment, solved, (Date.now() - started) / 1000) };
  }

  /** Small runs are not worth cutting: starting a thread costs more. */
  private partsOf(system: SpinSystem, experiment: Experiment): number {
    try {
      const { method, seconds } = estimateCost(system, experiment);
      if (method !== 'orientations' || seconds < WORTH_CUTTING) return 1;
      return Math.min(this.threads, planParts(system, experiment));
    } catch {
      // What can't be estimated is refused by the run itself, with its reason.
      return 1;
    }
  }

  private async ask(
    task: Omit<SimulateTask, 'port' | 'limits'>,
    onProgress: (fraction: number) => void,
    signal: AbortSignal,
  ): Promise<SimulateReply> {
    const { port1, port2 } = new MessageChannel();
    port1.on('message', onProgress);
    const limits = { bytes: this.settings.runBytes, seconds: this.settings.runSeconds };
    this.active++;
    try {
      return await this.pool.run({ ...task, limits, port: port2 }, { signal, transferList: [port2] });
    } finally {
      this.active--;
      port1.close();
    }
  }

  async onModuleDestroy(): Promise<void> {
    await this.pool.destroy();
  }
}
