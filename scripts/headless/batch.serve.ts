import { parentPort, workerData } from 'node:worker_threads';
import type { BatchJob, BatchReply } from './batch.messages.js';
import { describeFailure } from './failures.js';
import { runPair } from './pair.js';
import { writeResult } from './write.js';

const { workers } = workerData as { workers: number };

async function run({ name, system, experiment, out, form }: BatchJob): Promise<BatchReply> {
  try {
    await writeResult(
      runPair(system, experiment, () => {}, workers),
      form,
      out,
    );
    return { name, exitCode: 0, lines: [] };
  } catch (error) {
    return { name, ...describeFailure(error) };
  }
}

parentPort!.on('message', (job: BatchJob) => void run(job).then((reply) => parentPort!.postMessage(reply)));
