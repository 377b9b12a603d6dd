import { complexMatrix, type ComplexMatrix } from '../../algebra/dense.js';
import { expmDense } from '../../algebra/expm-dense.js';
import { expAction, sampleSignals, type KrylovCounts } from '../../algebra/krylov.js';
import { lanczosAction, lanczosSignal, type EigenFunction, type Sampling } from '../../algebra/lanczos.js';
import { rowSumNorm, type SparseComplex } from '../../algebra/sparse.js';
import type { ComplexArray } from '../../run/solved.js';

/** Numbers of the cost model, in seconds of one core: measured, not derived. */
const DENSE_FLOP = 4e-10;
const KRYLOV_ENTRY = 6e-9;
const KRYLOV_ROW = 5e-8;
/** The exponential of a small matrix, shared by the products of its step. */
const KRYLOV_PRODUCT = 1e-4;
export const LANCZOS_CUBE = 7e-10;
const LANCZOS_SQUARE = 1e-7;
const LANCZOS_SAMPLE = 6e-9;
/** Products of dense matrices in an exponential besides its squarings. */
const PADE_PRODUCTS = 10;
/** Matrix-vector products of a Krylov step for each radian of the matrix times t; found by trial. */
const PRODUCTS_PER_RADIAN = 4.5;
/** Relative error that Krylov steps may make over a whole signal or evolution. */
export const TOLERANCE = 1e-10;
/** Above these a dense matrix, or all vectors of a recursion, are not even thought of. */
const MOST_DENSE = 1200;
export const MOST_LANCZOS = 4000;

/** Seconds that exp(A t) v takes by a dense exponential. */
function denseSeconds(a: SparseComplex, t: number): number {
  if (a.size > MOST_DENSE) return Infinity;
  const squarings = Math.max(0, Math.log2(rowSumNorm(a) * t + 1));
  return DENSE_FLOP * 8 * a.size ** 3 * (PADE_PRODUCTS + squarings);
}

/** Seconds that exp(A t) v takes by Krylov steps, with `samples` on the way. */
function krylovSeconds(a: SparseComplex, t: number, samples = 0): number {
  const products = (PRODUCTS_PER_RADIAN * rowSumNorm(a) * t) / 2 + 30;
  return products * (KRYLOV_PRODUCT + KRYLOV_ENTRY * a.columns.length + KRYLOV_ROW * a.size) + samples * 2e-6;
}

/** Seconds that one signal takes by a whole Lanczos recursion. */
function lanczosSeconds({ size, columns }: SparseComplex, samples: number): number {
  if (size > MOST_LANCZOS) return Infinity;
  const products = KRYLOV_ENTRY * size * columns.length;
  return LANCZOS_CUBE * size ** 3 + LANCZOS_SQUARE * size ** 2 + products + LANCZOS_SAMPLE * size * samples;
}

/** Seconds that exp(A t) v takes by Lanczos recursions of its real and its imaginary part. */
function actionSeconds(a: SparseComplex): number {
  return 2 * lanczosSeconds(a, 0);
}

/** Seconds that evolving will take. */
export function evolutionSeconds(a: SparseComplex, t: number): number {
  return Math.min(denseSeconds(a, t), krylovSeconds(a, t), actionSeconds(a));
}

/** Seconds that sampling will take. */
export function samplingSeconds(a: SparseComplex, { dwell, points }: Sampling): number {
  return Math.min(lanczosSeconds(a, points), krylovSeconds(a, dwell * points, points));
}

/** What is known of one evolution that comes again: its dense exponential, or the seconds spent without one. */
export interface Repeated {
  propagator?: ComplexMatrix;
  spent: number;
}

/**
 * exp(A t) v by Krylov steps or Lanczos recursion, whichever is cheaper, or by a dense exponential as soon as that would not have
 * cost more than all that was spent on this evolution.
 */
export function evolveVector(
  a: SparseComplex,
  v: ComplexArray,
  t: number,
  populations: Float64Array,
  repeated: Repeated,
  counts: KrylovCounts,
): ComplexArray {
  const [dense, krylov, lanczos] = [denseSeconds(a, t), krylovSeconds(a, t), actionSeconds(a)];
  repeated.spent += Math.min(krylov, lanczos);
  if (!repeated.propagator && dense <= repeated.spent) repeated.propagator = expmDense(toDense(a, t));
  if (repeated.propagator) return matrixTimes(repeated.propagator, v);
  const evolved = lanczos < krylov ? symmetricAction(a, v, populations, exponential(t), counts) : null;
  return evolved ?? expAction(a, v, t, TOLERANCE, counts);
}

/**
 * The solution of dv/dt = A v + source after t: exp(A t) v and the integral of exp(A tau) source, by Lanczos recursions; null where
 * those break down or the size is beyond them.
 */
export function evolveWithSource(
  a: SparseComplex,
  v: ComplexArray,
  source: Float64Array,
  populations: Float64Array,
  t: number,
  counts: KrylovCounts,
): ComplexArray | null {
  if (a.size > MOST_LANCZOS) return null;
  const evolved = symmetricAction(a, v, populations, exponential(t), counts);
  if (!evolved) return null;
  const flow = { real: source, imag: new Float64Array(source.length) };
  const added = symmetricAction(a, flow, populations, exponentialIntegral(t), counts);
  if (!added) return null;
  for (let i = 0; i < a.size; i++) {
    evolved.real[i] += added.real[i];
    evolved.imag[i] += added.imag[i];
  }
  return evolved;
}

/** f(A) v by way of the symmetric D^-1 A D, D the roots of the populations. */
function symmetricAction(
  a: SparseComplex,
  v: ComplexArray,
  populations: Float64Array,
  f: EigenFunction,
  counts: KrylovCounts,
): ComplexArray | null {
  const roots = populations.map(Math.sqrt);
  const start = { real: v.real.map((x, i) => x / roots[i]), imag: v.imag.map((x, i) => x / roots[i]) };
  const out = lanczosAction(symmetrised(a, roots), start, f, counts);
  return out && { real: out.real.map((x, i) => x * roots[i]), imag: out.imag.map((x, i) => x * roots[i]) };
}

/** exp(x t) */
function exponential(t: number): EigenFunction {
  return (re, im) => {
    const size = Math.exp(re * t);
    return [size * Math.cos(im * t), size * Math.sin(im * t)];
  };
}

/** (exp(x t) - 1)/x, by its series for small x t. */
function exponentialIntegral(t: number): EigenFunction {
  const whole = exponential(t);
  return (re, im) => {
    const size = re * re + im * im;
    if (size * t * t < 1e-8)
      return [t + (re * t * t) / 2 + ((re * re - im * im) * t ** 3) / 6, (im * t * t) / 2 + (re * im * t ** 3) / 3];
    const [er, ei] = whole(re, im);
    return [((er - 1) * re + ei * im) / size, (ei * re - (er - 1) * im) / size];
  };
}

/**
 * sum_i probe_i (exp(A k dwell) v)_i, k = 0..points-1, for each probe, by Lanczos recursion or Krylov steps. `populations` gives, for
 * each element, that of its exchange state: the square roots are what makes A symmetric, as exchange obeys detailed balance.
 */
export function signalsOf(
  a: SparseComplex,
  v: ComplexArray,
  probes: readonly Float64Array[],
  populations: Float64Array,
  sampling: Sampling,
  counts: KrylovCounts,
  onProgress: (fraction: number) => void,
): ComplexArray[] {
  const steps = () => sampleSignals(a, v, probes, sampling, TOLERANCE, counts, (k) => onProgress(k / sampling.points));
  const { dwell, points } = sampling;
  if (krylovSeconds(a, dwell * points, points) < probes.length * lanczosSeconds(a, points)) return steps();
  const roots = populations.map(Math.sqrt);
  const symmetric = symmetrised(a, roots);
  const start = { real: v.real.map((x, i) => x / roots[i]), imag: v.imag.map((x, i) => x / roots[i]) };
  const signals: ComplexArray[] = [];
  for (const [done, probe] of probes.entries()) {
    const weighted = probe.map((x, i) => x * roots[i]);
    const signal = lanczosSignal(symmetric, weighted, start, sampling, counts, (fraction) =>
      onProgress((done + fraction) / probes.length),
    );
    if (!signal) return steps();
    signals.push(signal);
  }
  return signals;
}

/** D^-1 A D of the diagonal D. */
function symmetrised(a: SparseComplex, d: Float64Array): SparseComplex {
  const [real, imag] = [a.real.slice(), a.imag.slice()];
  for (let r = 0; r < a.size; r++) {
    for (let p = a.start[r]; p < a.start[r + 1]; p++) {
      const factor = d[a.columns[p]] / d[r];
      real[p] *= factor;
      imag[p] *= factor;
    }
  }
  return { ...a, real, imag };
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
