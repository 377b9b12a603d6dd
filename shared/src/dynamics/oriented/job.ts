import type { SignalSum } from './signal-sum.js';

/** Work that can be cut into units, each adding its share of the signal to a sum; units in order cost least. */
export interface Job {
  readonly units: number;
  /** Field directions of the whole set modulo inversion. */
  readonly orientations: number;
  /** Frequencies at each direction. */
  readonly transitions: number;
  /** Relative cost of a unit, in directions. */
  costOf(unit: number): number;
  run(unit: number, sum: SignalSum): void;
}

/** Runs the units of part `part` of `parts`: contiguous, of equal cost. `tick` hears the fraction done. */
export function runPart(
  jobs: readonly Job[],
  part: number,
  parts: number,
  sum: SignalSum,
  tick: (fraction: number) => void,
): void {
  const total = jobs.reduce((all, job) => all + costOfJob(job), 0);
  let before = 0;
  for (const job of jobs) {
    for (let unit = 0; unit < job.units; unit++) {
      const cost = job.costOf(unit);
      const done = ((before + cost / 2) / total) * parts - part;
      if (done >= 0 && done < 1) {
        job.run(unit, sum);
        tick(done);
      }
      before += cost;
    }
  }
}

function costOfJob(job: Job): number {
  let cost = 0;
  for (let unit = 0; unit < job.units; unit++) cost += job.costOf(unit);
  return cost;
}
