import { MessageChannel } from 'node:worker_threads';
import { Inject, Injectable, type OnModuleDestroy } from '@nestjs/common';
import type { Experiment, SpinSystem } from '@heddle/shared';
import { Piscina } from 'piscina';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import type { SimulateReply, SimulateTask } from './simulate.messages.js';
import { workerFile } from './worker-file.js';

/** Worker threads that simulate, one run each at a time. */
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

  /** Simulates in a thread. Rejects with an AbortError as soon as `signal` fires, and ends the thread. */
  async simulate(
    system: SpinSystem,
    experiment: Experiment,
    onProgress: (fraction: number) => void,
    signal: AbortSignal,
  ): Promise<SimulateReply> {
    const { port1, port2 } = new MessageChannel();
    port1.on('message', onProgress);
    const limits = { bytes: this.settings.runBytes, seconds: this.settings.runSeconds };
    this.active++;
    try {
      return await this.pool.run({ system, experiment, limits, port: port2 }, { signal, transferList: [port2] });
    } finally {
      this.active--;
      port1.close();
    }
  }

  async onModuleDestroy(): Promise<void> {
    await this.pool.destroy();
  }
}
