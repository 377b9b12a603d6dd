import { EngineError, simulate, simulatePart } from '@heddle/shared';
import type { SimulateReply, SimulateTask } from './simulate.messages.js';

/** Milliseconds between two reports of progress. */
const REPORT_EVERY = 200;

/** One run, or one part of it, in a worker thread. Cancelling ends the thread. */
export default function run({ system, experiment, limits, port, part }: SimulateTask): SimulateReply {
  let reported = Date.now();
  const tick = (fraction: number) => {
    if (Date.now() - reported < REPORT_EVERY) return;
    reported = Date.now();
    port.postMessage(fraction);
  };
  try {
    if (part) return { kind: 'part', signal: simulatePart(system, experiment, part.index, part.of, { tick, limits }) };
    const { spectrum, fid, lines, report } = simulate(system, experiment, { tick, limits });
    return { kind: 'done', result: { spectrum, fid, lines, report } };
  } catch (error) {
    if (error instanceof EngineError) return { kind: 'refused', code: error.code, message: error.message };
    throw error;
  } finally {
    port.close();
  }
}
