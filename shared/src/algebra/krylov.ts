import type { ComplexArray } from '../run/solved.js';
import { complexMatrix, type ComplexMatrix } from './dense.js';
import { expmDense } from './expm-dense.js';
import { applySparseInto, type SparseComplex } from './sparse.js';

/**
 * exp(A t) v of a large sparse matrix from small Krylov spaces: A V = V H + h v_next e_m^T, exp(A t) v ~ |v| V exp(H t) e_1
 * (Y. Saad, SIAM J. Numer. Anal. 29 (1992) 209), the vectors made orthogonal to the last two only, which loses little for
 * the nearly normal matrices of spin dynamics and makes a step cheap (Gaudreault, Rainwater & Tokman, J. Comput. Phys. 372
 * (2018) 236). The local error is taken as h times the integral of the last component of exp(H t) e_1.
 */

/** Dimension of a Krylov space. Found by trial on ladders of exchanging and relaxing spins; not derived. */
const DEPTH = 30;
/** A new direction this short beside the matrix is rounding: the space is closed. */
const CLOSED = 1e-13;

interface KrylovSpace {
  readonly basis: readonly ComplexArray[];
  /** m x m */
  readonly h: ComplexMatrix;
  readonly next: number;
  readonly norm: number;
}

/** Counts what was done, for the report. */
export interface KrylovCounts {
  products: number;
}

/** The projection of A onto the Krylov space of v. */
function krylovSpace(a: SparseComplex, v: ComplexArray, counts: KrylovCounts): KrylovSpace {
  const n = a.size;
  const most = Math.min(DEPTH, n);
  const norm = length(v);
  const basis: ComplexArray[] = [scaled(v, norm > 0 ? 1 / norm : 0)];
  const h = complexMatrix(most, most);
  let w = { real: new Float64Array(n), imag: new Float64Array(n) };
  for (let j = 0; j < most; j++) {
    applySparseInto(w, a, basis[j]);
    counts.products++;
    const size = length(w);
    for (let i = Math.max(0, j - 1); i <= j; i++) orthogonalise(w, basis[i], h, i * most + j);
    const next = length(w);
    if (next <= CLOSED * size || size === 0) return { basis, h: leading(h, j + 1), next: 0, norm };
    if (j + 1 === most) return { basis, h, next, norm };
    h.real[(j + 1) * most + j] = next;
    basis.push(scaled(w, 1 / next));
    w = { real: new Float64Array(n), imag: new Float64Array(n) };
  }
  throw new RangeError('A Krylov space needs a vector');
}

/** Takes <q|w> q off w and notes the factor. */
function orthogonalise(w: ComplexArray, q: ComplexArray, h: ComplexMatrix, place: number): void {
  let re = 0;
  let im = 0;
  for (let k = 0; k < w.real.length; k++) {
    re += q.real[k] * w.real[k] + q.imag[k] * w.imag[k];
    im += q.real[k] * w.imag[k] - q.imag[k] * w.real[k];
  }
  for (let k = 0; k < w.real.length; k++) {
    w.real[k] -= re * q.real[k] - im * q.imag[k];
    w.imag[k] -= re * q.imag[k] + im * q.real[k];
  }
  h.real[place] += re;
  h.imag[place] += im;
}

/** exp(A t) v, to `tolerance` of |v|. */
export function expAction(
  a: SparseComplex,
  v: ComplexArray,
  t: number,
  tolerance: number,
  counts: KrylovCounts = { products: 0 },
): ComplexArray {
  const allowed = (tolerance * length(v)) / Math.max(t, Number.MIN_VALUE);
  let state = v;
  let done = 0;
  let step = t;
  while (done < t) {
    const space = krylovSpace(a, state, counts);
    step = Math.min(t - done, 2 * step);
    let y = exponentialColumn(space, step);
    while (space.next > 0 && localError(space, y, step) > allowed * step) {
      step /= 2;
      y = exponentialColumn(space, step);
    }
    state = combine(space.basis, y);
    done = step === t - done ? t : done + step;
  }
  return state;
}

/**
 * Signals sum_i probe_i (exp(A k dwell) v)_i for k = 0..points-1, one for each probe, to about `tolerance` of |v| for unit
 * probes. Within one Krylov space only small vectors move from sample to sample.
 */
export function sampleSignals(
  a: SparseComplex,
  v: ComplexArray,
  probes: readonly Float64Array[],
  sampling: { dwell: number; points: number },
  tolerance: number,
  counts: KrylovCounts,
  onSample: (k: number) => void = () => undefined,
): ComplexArray[] {
  const { dwell, points } = sampling;
  const signals = probes.map(() => ({ real: new Float64Array(points), imag: new Float64Array(points) }));
  const allowed = (tolerance * length(v)) / points;
  let state = v;
  let k = 0;
  while (k < points) {
    const space = krylovSpace(a, state, counts);
    const seen = probes.map((probe) => space.basis.map((q) => probed(probe, q)));
    const m = space.basis.length;
    const step = expmDense(times(space.h, dwell));
    let y = complexMatrix(m, 1);
    y.real[0] = space.norm;
    let spent = 0;
    let taken = 0;
    for (; k + taken < points; taken++) {
      seen.forEach((row, p) => {
        const at = k + taken;
        for (let j = 0; j < m; j++) {
          signals[p].real[at] += row[j][0] * y.real[j] - row[j][1] * y.imag[j];
          signals[p].imag[at] += row[j][0] * y.imag[j] + row[j][1] * y.real[j];
        }
      });
      const next = moved(step, y);
      spent += space.next * dwell * Math.hypot(next.real[m - 1], next.imag[m - 1]);
      if (spent > allowed * (taken + 1)) break;
      y = next;
    }
    if (k + taken >= points) break;
    // The sample at k + taken is written; go there, or cross one dwell in shorter steps where even that was too far.
    if (taken > 0) state = combine(space.basis, y);
    else {
      state = expAction(a, state, dwell, tolerance / points, counts);
      taken = 1;
    }
    k += taken;
    for (const signal of signals) signal.real[k] = signal.imag[k] = 0;
    onSample(k);
  }
  return signals;
}

function exponentialColumn(space: KrylovSpace, t: number): ComplexMatrix {
  const m = space.basis.length;
  const exponential = expmDense(times(space.h, t));
  const y = complexMatrix(m, 1);
  for (let i = 0; i < m; i++) {
    y.real[i] = space.norm * exponential.real[i * m];
    y.imag[i] = space.norm * exponential.imag[i * m];
  }
  return y;
}

function localError({ next, basis }: KrylovSpace, y: ComplexMatrix, t: number): number {
  const last = basis.length - 1;
  return next * t * Math.hypot(y.real[last], y.imag[last]);
}

function moved(step: ComplexMatrix, y: ComplexMatrix): ComplexMatrix {
  const m = step.rows;
  const out = complexMatrix(m, 1);
  for (let i = 0, p = 0; i < m; i++) {
    let re = 0;
    let im = 0;
    for (let j = 0; j < m; j++, p++) {
      re += step.real[p] * y.real[j] - step.imag[p] * y.imag[j];
      im += step.real[p] * y.imag[j] + step.imag[p] * y.real[j];
    }
    out.real[i] = re;
    out.imag[i] = im;
  }
  return out;
}

function combine(basis: readonly ComplexArray[], y: ComplexMatrix): ComplexArray {
  const n = basis[0].real.length;
  const out = { real: new Float64Array(n), imag: new Float64Array(n) };
  basis.forEach((q, j) => {
    const [re, im] = [y.real[j], y.imag[j]];
    for (let k = 0; k < n; k++) {
      out.real[k] += re * q.real[k] - im * q.imag[k];
      out.imag[k] += re * q.imag[k] + im * q.real[k];
    }
  });
  return out;
}

function probed(probe: Float64Array, q: ComplexArray): [number, number] {
  let re = 0;
  let im = 0;
  for (let k = 0; k < probe.length; k++) {
    re += probe[k] * q.real[k];
    im += probe[k] * q.imag[k];
  }
  return [re, im];
}

function times(a: ComplexMatrix, t: number): ComplexMatrix {
  return complexMatrix(
    a.rows,
    a.columns,
    a.real.map((x) => x * t),
    a.imag.map((x) => x * t),
  );
}

function leading(h: ComplexMatrix, m: number): ComplexMatrix {
  const out = complexMatrix(m, m);
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < m; j++) {
      out.real[i * m + j] = h.real[i * h.columns + j];
      out.imag[i * m + j] = h.imag[i * h.columns + j];
    }
  }
  return out;
}

function length(v: ComplexArray): number {
  let sum = 0;
  for (let k = 0; k < v.real.length; k++) sum += v.real[k] * v.real[k] + v.imag[k] * v.imag[k];
  return Math.sqrt(sum);
}

function scaled(v: ComplexArray, factor: number): ComplexArray {
  return { real: v.real.map((x) => x * factor), imag: v.imag.map((x) => x * factor) };
}
