import type { Spectrum } from '@heddle/shared';
import { ppmAt } from './axis';

export interface Peak {
  readonly ppm: number;
  readonly height: number;
}

/**
 * Local maxima of the real part above `share` of its highest point, highest ppm first, each at the top of the parabola
 * through its three points. No more than `most`, the highest of them.
 */
export function pickPeaks({ real, ...spectrum }: Spectrum, share: number, most = 200): Peak[] {
  let highest = 0;
  for (const value of real) if (value > highest) highest = value;
  const floor = share * highest;
  const peaks: Peak[] = [];
  for (let i = 1; i + 1 < real.length; i++) {
    const [a, b, c] = [real[i - 1], real[i], real[i + 1]];
    if (b <= floor || b < a || b <= c) continue;
    const bend = a - 2 * b + c;
    const shift = bend === 0 ? 0 : (a - c) / (2 * bend);
    peaks.push({ ppm: ppmAt({ real, ...spectrum }, i + shift), height: b - ((a - c) * shift) / 4 });
  }
  if (peaks.length <= most) return peaks;
  const least = [...peaks].sort((p, q) => q.height - p.height)[most - 1].height;
  return peaks.filter(({ height }) => height >= least);
}
