import { readdirSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import { OptionRefused } from './failures.js';
import type { BatchJob, BatchReply } from './batch.messages.js';
import { ENDINGS, type Form } from './write.js';

/** Simulates every pair of a folder on all cores. Returns the exit code: 2 if any was refused, else 1 if any failed. */
export async function runBatch(folder: string, form: Form): Promise<number> {
  const jobs = findPairs(folder, form);
  const queue = [...jobs];
  let done = 0;
  let exitCode = 0;
  const finish = (reply: BatchReply) => {
    done += 1;
    exitCode = Math.max(exitCode, reply.exitCode);
    if (process.stderr.isTTY) process.stderr.write('\r\x1b[K');
    for (const line of reply.lines) process.stderr.write(`${reply.name}: ${line}\n`);
    if (process.stderr.isTTY) process.stderr.write(`simulated ${done} of ${jobs.length}`);
  };
  const workers = Math.min(availableParallelism(), jobs.length);
  await Promise.all(Array.from({ length: workers }, () => serve(queue, workers, finish)));
  if (process.stderr.isTTY) process.stderr.write('\n');
  return exitCode;
}

function findPairs(folder: string, form: Form): BatchJob[] {
  let files: Set<string>;
  try {
    files = new Set(readdirSync(folder));
  } catch {
    throw new OptionRefused(`--batch takes a folder that can be read, not '${folder}'`);
  }
  const names = [...files]
    .flatMap((file) => (file.endsWith('.system.json') ? [file.slice(0, -'.system.json'.length)] : []))
    .sort();
  const paired = names.filter((name) => files.has(`${name}.experiment.json`));
  for (const name of names) {
    if (!paired.includes(name)) process.stderr.write(`${name}: left out, there is no ${name}.experiment.json\n`);
  }
  if (paired.length === 0)
    throw new OptionRefused(`there is no NAME.system.json with its NAME.experiment.json in '${folder}'`);
  return paired.map((name) => ({
    name,
    system: join(folder, `${name}.system.json`),
    experiment: join(folder, `${name}.experiment.json`),
    out: join(folder, `${name}.result${ENDINGS[form]}`),
    form,
  }));
}

/** Gives one worker thread jobs until the queue is empty. A thread that dies fails its job and is replaced. */
async function serve(queue: BatchJob[], workers: number, finish: (reply: BatchReply) => void): Promise<void> {
  let worker: Worker | undefined;
  for (let job = queue.shift(); job; job = queue.shift()) {
    worker ??= startWorker(workers);
    const reply = await ask(worker, job);
    if (reply.lost) worker = undefined;
    finish(reply);
  }
  await worker?.terminate();
}

function startWorker(workers: number): Worker {
  return new Worker(new URL('./batch.worker.mjs', import.meta.url), { workerData: { workers } });
}

/** One job, one answer. Only our own listeners are taken off: a Worker keeps some for itself. */
function ask(worker: Worker, job: BatchJob): Promise<BatchReply & { lost?: boolean }> {
  return new Promise((resolve) => {
    const settle = (reply: BatchReply & { lost?: boolean }) => {
      worker.off('message', settle).off('error', onError).off('exit', onExit);
      resolve(reply);
    };
    const lost = (line: string) => settle({ name: job.name, exitCode: 1, lines: [line], lost: true });
    const onError = (error: Error) => lost(error.message);
    const onExit = () => lost('the worker thread ended early');
    worker.on('message', settle).on('error', onError).on('exit', onExit);
    worker.postMessage(job);
  });
}
