import { parseExperiment, parseSystem, simulate } from '@heddle/shared';
import { WorkerPool } from '../src/jobs/worker-pool.js';
import { readSettings } from '../src/config/settings.js';

const system = parseSystem({
  format: 'heddle.spin-system/1',
  name: 'Three protons',
  nuclei: ['A', 'B', 'C'].map((id, i) => ({ id, isotope: '1H', shift: i, position: [2 * i, i % 2, i * i] })),
  couplings: [
    { between: ['A', 'B'], dipolar: 'positions' },
    { between: ['B', 'C'], dipolar: 'positions' },
    { between: ['A', 'C'], dipolar: 'positions' },
  ],
});
const experiment = parseExperiment({
  format: 'heddle.experiment/1',
  protonMHz: 400,
  observe: '1H',
  sample: { kind: 'powder', orientations: 12_000 },
  lineWidth: 300,
  acquisition: { centre: 1, width: 100_000, points: 256 },
});

it('an oriented run that is cut over the threads equals the whole one', async () => {
  const pool = new WorkerPool({ ...readSettings(), workers: 2 });
  const seen: number[] = [];
  try {
    const reply = await pool.simulate(
      system,
      experiment,
      (fraction) => seen.push(fraction),
      new AbortController().signal,
    );
    if (reply.kind !== 'done') throw new Error(reply.kind);
    const whole = simulate(system, experiment);
    whole.fid.real.forEach((value, k) => expect(reply.result.fid.real[k]).toBeCloseTo(value, 12));
    whole.fid.imag.forEach((value, k) => expect(reply.result.fid.imag[k]).toBeCloseTo(value, 12));
    expect(seen.every((fraction) => fraction >= 0 && fraction <= 1)).toBe(true);
  } finally {
    await pool.onModuleDestroy();
  }
});
