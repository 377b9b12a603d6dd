import type { Result } from '../src/documents/result.js';

/** End corrections of Gregory's quadrature, for the forward differences at the first point (M. Abramowitz and I. A. Stegun 1964, 25.4.7). */
const GREGORY = [1 / 12, -1 / 24, 19 / 720, -3 / 160, 863 / 60480, -275 / 24192, 33953 / 3628800, -8183 / 1036800];

/**
 * Absorption 2 Re of the integral over t of s(t) exp(-2 pi i nu t) from the sampled FID, per Hz: free of the aliasing of the discrete
 * transform. The FID must have decayed at its end and be sampled well below its fastest motion. `offset` in Hz from the carrier.
 */
export function absorptionAt({ fid }: Pick<Result, 'fid'>, offset: number): number {
  const turned = (k: number) => {
    const angle = -2 * Math.PI * offset * k * fid.dwell;
    return fid.real[k] * Math.cos(angle) - fid.imag[k] * Math.sin(angle);
  };
  let sum = turned(0) / 2;
  for (let k = 1; k < fid.real.length; k++) sum += turned(k);
  let differences = Array.from({ length: GREGORY.length + 1 }, (_, k) => turned(k));
  for (const coefficient of GREGORY) {
    differences = differences.slice(1).map((value, k) => value - differences[k]);
    sum += coefficient * differences[0];
  }
  return 2 * fid.dwell * sum;
}
