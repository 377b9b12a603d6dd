import { describe, expect, it } from 'vitest';
import type { ComparedSignal } from './discrimination.js';
import { DECISIVE_DISTANCE, discriminate } from './discrimination.js';

/** FID of unit lines at the given offsets (Hz) and its absorption by the plain sum, width 200 Hz, 256 points. */
function signal(offsets: number[], height = 1): ComparedSignal {
  const [points, width] = [256, 200];
  const real = new Float64Array(points);
  const imag = new Float64Array(points);
  for (let k = 0; k < points; k++) {
    for (const offset of offsets) {
      const decay = height * Math.exp((-Math.PI * 2 * k) / width);
      real[k] += decay * Math.cos((2 * Math.PI * offset * k) / width);
      imag[k] += decay * Math.sin((2 * Math.PI * offset * k) / width);
    }
  }
  const absorption = Float64Array.from({ length: points }, (_, j) => {
    const offset = ((points / 2 - 1 - j) * width) / points;
    let sum = 0;
    for (let k = 0; k < points; k++) {
      const angle = (2 * Math.PI * offset * k) / width;
      sum += (k === 0 ? 0.5 : 1) * (real[k] * Math.cos(angle) + imag[k] * Math.sin(angle));
    }
    return (2 / width) * sum;
  });
  return {
    fid: { real, imag },
    spectrum: { firstPpm: 127, lastPpm: -128, real: absorption, imag: new Float64Array(points) },
  };
}

const budget = { noise: 0.5, repetition: 4 };

describe('telling candidates apart', () => {
  it('finds no distance between a candidate and itself in another amount', () => {
    const { perScan } = discriminate(signal([10, -30]), signal([10, -30], 3), budget);
    expect(perScan).toBeLessThan(1e-6);
  });

  it('equals the norm of the difference over the noise for signals that do not overlap', () => {
    // Orthogonal signals: the best scale is nearly 0 and |a - c b| is nearly |a|.
    const a = signal([60]);
    const norm = Math.sqrt(a.fid.real.reduce((sum, value, k) => sum + value ** 2 + a.fid.imag[k] ** 2, 0));
    expect(discriminate(a, signal([-60]), budget).perScan / (norm / budget.noise)).toBeCloseTo(1, 3);
  });

  it('needs a quarter of the time at half the noise', () => {
    const [a, b] = [signal([10, -30]), signal([10, -32])];
    const loud = discriminate(a, b, budget);
    expect(discriminate(a, b, { ...budget, noise: 0.25 }).hours).toBeCloseTo(loud.hours / 4, 12);
    expect(loud.perHour).toBeCloseTo(loud.perScan * Math.sqrt(900), 9);
    expect(loud.hours * loud.perHour ** 2).toBeCloseTo(DECISIVE_DISTANCE ** 2, 9);
  });

  it('points at the lines that differ', () => {
    const { region } = discriminate(signal([40, -30]), signal([40, -34]), budget);
    // One ppm a point; -30 and -34 Hz stand at points 38 and 44 below the centre.
    expect(region.high).toBeLessThan(-34);
    expect(region.low).toBeGreaterThan(-48);
  });
});
