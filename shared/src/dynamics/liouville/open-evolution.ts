import { complexMatrix, multiplyComplex, type ComplexMatrix } from '../../algebra/dense.js';
import { expmDense } from '../../algebra/expm-dense.js';
import { expAction, sampleSignals, type KrylovCounts } from '../../algebra/krylov.js';
import { rowSumNorm, type SparseComplex } from '../../algebra/sparse.js';
import type { ComplexArray } from '../../run/solved.js';

/** Numbers of the cost model, in seconds of one core: measured, not derived. */
const DENSE_FLOP = 4e-10;
const KRYLOV_ENTRY = 6e-9;
const KRYLOV_ROW = 5e-8;
/** Products of dense matrices in an exponential besides its squarings. */
const PADE_PRODUCTS = 10;
/** Matrix-vector products of a Krylov step for each radian of the matrix times t; found by trial. */
const PRODUCTS_PER_RADIAN = 0.9;
/** Relative error that Krylov steps may make over a whole signal or evolution. */
const TOLERANCE = 1e-10;
/** Above this a dense matrix is not even thought of. */
const MOST_DENSE = 1200;

/** Seconds that exp(A t) v takes by a dense exponential and by Krylov steps. */
function costs(a: SparseComplex, t: number, samples: number): { dense: number; krylov: number } {
  const n = a.size;
  const squarings = Math.max(0, Math.log2(rowSumNorm(a) * (samples > 1 ? t / samples : t) + 1));
  const giant = samples > 1 ? Math.log2(samples) / 2 : 0;
  const dense =
    n > MOST_DENSE ? Infinity : DENSE_FLOP * 8 * n ** 3 * (PADE_PRODUCTS + squarings + giant) + 1e-8 * samples * n;
  const radius = rowSumNorm(a) / 2;
  const products = PRODUCTS_PER_RADIAN * radius * t + 30;
  const krylov = products * (KRYLOV_ENTRY * a.columns.length + KRYLOV_ROW * n) + samples * 2e-6;
  return { dense, krylov };
}

/** Seconds that evolving or sampling will take. */
export function evolutionSeconds(a: SparseComplex, t: number, samples = 1): number {
  const { dense, krylov } = costs(a, t, samples);
  return Math.min(dense, krylov);
}

/** exp(A t) v by the cheaper of a dense exponential, kept for the next time, and Krylov steps. */
export function evolveVector(
  a: SparseComplex,
  v: ComplexArray,
  t: number,
  kept: Map<string, ComplexMatrix>,
  key: string,
  counts: KrylovCounts,
): ComplexArray {
  const stored = kept.get(key);
  const { dense, krylov } = costs(a, t, 1);
  if (!stored && dense > krylov) return expAction(a, v, t, TOLERANCE, counts);
  const propagator = stored ?? expmDense(toDense(a, t));
  kept.set(key, propagator);
  return matrixTimes(propagator, v);
}

/** sum_i probe_i (exp(A k dwell) v)_i, k = 0..points-1, for each probe. */
export function signalsOf(
  a: SparseComplex,
  v: ComplexArray,
  probes: readonly Float64Array[],
  sampling: { dwell: number; points: number },
  counts: KrylovCounts,
  onSample: (k: number) => void,
): ComplexArray[] {
  const { dense, krylov } = costs(a, sampling.dwell * sampling.points, sampling.points);
  if (dense > krylov) return sampleSignals(a, v, probes, sampling, TOLERANCE, counts, onSample);
  return denseSignals(a, v, probes, sampling);
}

/**
 * Baby steps and giant steps: with E = exp(A dwell) and B near the square root of the points, sample i B + j is
 * (probe E^(B i)) . (E^j v), so that 2 B products with a vector replace one for each sample.
 */
function denseSignals(
  a: SparseComplex,
  v: ComplexArray,
  probes: readonly Float64Array[],
  { dwell, points }: { dwell: number; points: number },
): ComplexArray[] {
  const baby = 2 ** Math.ceil(Math.log2(Math.sqrt(points)));
  const step = expmDense(toDense(a, dwell));
  const vectors: ComplexArray[] = [v];
  for (let j = 1; j < baby; j++) vectors.push(matrixTimes(step, vectors[j - 1]));
  let giant = step;
  for (let size = 1; size < baby; size *= 2) giant = multiplyComplex(giant, giant);
  return probes.map((probe) => {
    const signal = { real: new Float64Array(points), imag: new Float64Array(points) };
    let row: ComplexArray = { real: probe.slice(), imag: new Float64Array(probe.length) };
    for (let base = 0; base < points; base += baby) {
      for (let j = 0; j < baby && base + j < points; j++) dotInto(signal, base + j, row, vectors[j]);
      row = rowTimes(row, giant);
    }
    return signal;
  });
}

function dotInto(signal: ComplexArray, at: number, row: ComplexArray, v: ComplexArray): void {
  let re = 0;
  let im = 0;
  for (let k = 0; k < row.real.length; k++) {
    re += row.real[k] * v.real[k] - row.imag[k] * v.imag[k];
    im += row.real[k] * v.imag[k] + row.imag[k] * v.real[k];
  }
  signal.real[at] = re;
  signal.imag[at] = im;
}

function toDense({ size, start, columns, real, imag }: SparseComplex, factor: number): ComplexMatrix {
  const out = complexMatrix(size, size);
  for (let r = 0; r < size; r++) {
    for (let p = start[r]; p < start[r + 1]; p++) {
      out.real[r * size + columns[p]] = factor * real[p];
      out.imag[r * size + columns[p]] = factor * imag[p];
    }
  }
  return out;
}

function matrixTimes(a: ComplexMatrix, v: ComplexArray): ComplexArray {
  const n = a.rows;
  const out = { real: new Float64Array(n), imag: new Float64Array(n) };
  for (let i = 0, p = 0; i < n; i++) {
    let re = 0;
    let im = 0;
    for (let k = 0; k < n; k++, p++) {
      re += a.real[p] * v.real[k] - a.imag[p] * v.imag[k];
      im += a.real[p] * v.imag[k] + a.imag[p] * v.real[k];
    }
    out.real[i] = re;
    out.imag[i] = im;
  }
  return out;
}

function rowTimes(row: ComplexArray, a: ComplexMatrix): ComplexArray {
  const n = a.rows;
  const out = { real: new Float64Array(n), imag: new Float64Array(n) };
  for (let i = 0, p = 0; i < n; i++) {
    const [re, im] = [row.real[i], row.imag[i]];
    for (let k = 0; k < n; k++, p++) {
      out.real[k] += re * a.real[p] - im * a.imag[p];
      out.imag[k] += re * a.imag[p] + im * a.real[p];
    }
  }
  return out;
}
