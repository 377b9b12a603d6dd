import type { ComplexArray } from '../run/solved.js';
import { Rotations, spectralMeasure, type SpectralMeasure } from './eigen/complex-tridiagonal.js';
import { withKernels, type Kernels, type KernelWorkspace, type Slab } from './kernels/kernels.js';
import { OrthogonalityLoss } from './orthogonality-loss.js';
import { applySparseInto, type SparseComplex } from './sparse.js';

/**
 * Signals p^T exp(A t) v of a large sparse complex symmetric A by Lanczos recursion with the product x^T y (G. Moro and J. H.
 * Freed, J. Chem. Phys. 74 (1981) 3757): A Q = Q T with T tridiagonal and Q^T Q = 1, so that q^T exp(A t) q = e1^T exp(T t) e1 for
 * all times at once. The vectors are kept orthogonal to all before them, to the root of rounding or better, which leaves T exact
 * (H. D. Simon, Math. Comput. 42 (1984) 115), so that the recursion ends with the size of A at the latest.
 */
export interface Sampling {
  readonly dwell: number;
  readonly points: number;
}

/** x^T x below this part of |x|^2 has lost its figures. */
const BREAKDOWN = 1e-6;
/** Overlaps above this are taken off; a tenth of the root of rounding. */
const MOST_OVERLAP = 1e-9;
/** A new direction this short beside A q is made of what cancelled, */
const CANCELLED = 1e-2;
/** and this short it is rounding. */
const CLOSED = 1e-12;
/** A only damps: eigenvalues that grow by more than this part of the largest are wrong. */
const GROWTH = 1e-7;
/** Weights below this part of the whole are left out. */
const FAINT = 1e-15;

/**
 * p^T exp(A k dwell) v for k = 0..points-1; null where the recursion breaks down, so that another method must serve. A must only damp. Where v is not
 * a multiple of p two recursions are needed, as p^T f v = [(p+v)^T f (p+v) - (p-v)^T f (p-v)]/4. A size of n takes n^3 operations
 * and room for n^2 complex numbers. `onStep` hears the fraction done.
 */
export function lanczosSignal(
  a: SparseComplex,
  p: Float64Array,
  v: ComplexArray,
  sampling: Sampling,
  counts: { products: number },
  onStep: (fraction: number) => void = () => undefined,
): ComplexArray | null {
  const out = { real: new Float64Array(sampling.points), imag: new Float64Array(sampling.points) };
  const ratio = ratioOf(v, p);
  if (ratio) {
    const measure = wholeMeasure(a, { real: p, imag: new Float64Array(p.length) }, counts, onStep);
    if (!measure) return null;
    addSignal(out, measure, ratio, sampling);
    return out;
  }
  // Balanced lengths, so that neither drowns in the other.
  const scale = Math.sqrt(length(v) / length({ real: p, imag: new Float64Array(0) }));
  for (const sign of [1, -1]) {
    const start = {
      real: v.real.map((x, k) => x / scale + sign * p[k] * scale),
      imag: v.imag.map((x) => x / scale),
    };
    const measure = wholeMeasure(a, start, counts, (fraction) => onStep((fraction + (sign < 0 ? 1 : 0)) / 2));
    if (!measure) return null;
    addSignal(out, measure, [sign / 4, 0], sampling);
  }
  return out;
}

/** A function of an eigenvalue, and its value as [real, imaginary]. */
export type EigenFunction = (real: number, imag: number) => [number, number];

/** f(A) v of a complex symmetric A: Q X f X^T e1 from the recursion; null where it breaks down. Real and imaginary part apart. */
export function lanczosAction(
  a: SparseComplex,
  v: ComplexArray,
  f: EigenFunction,
  counts: { products: number },
  onStep: (fraction: number) => void = () => undefined,
): ComplexArray | null {
  const out = complexArray(a.size);
  for (const part of ['real', 'imag'] as const) {
    const start = { real: v[part], imag: new Float64Array(a.size) };
    const size = length(start);
    if (size === 0) continue;
    const turned = withKernels(2 * a.size * (a.size + 6), (workspace) => {
      const recursion = new Recursion(a, start, [size, 0], workspace);
      recursion.complete(counts, onStep);
      return recursion.apply(f);
    });
    if (!turned) return null;
    for (let k = 0; k < a.size; k++) {
      out.real[k] += part === 'real' ? size * turned.real[k] : -size * turned.imag[k];
      out.imag[k] += part === 'real' ? size * turned.imag[k] : size * turned.real[k];
    }
  }
  return out;
}

/** r with v = r p, if there is one. */
function ratioOf({ real, imag }: ComplexArray, p: Float64Array): [number, number] | null {
  let [re, im, size, norm] = [0, 0, 0, 0];
  for (let k = 0; k < p.length; k++) {
    re += p[k] * real[k];
    im += p[k] * imag[k];
    size += p[k] * p[k];
    norm += real[k] * real[k] + imag[k] * imag[k];
  }
  const ratio: [number, number] = [re / size, im / size];
  let rest = 0;
  for (let k = 0; k < p.length; k++) rest += (real[k] - ratio[0] * p[k]) ** 2 + (imag[k] - ratio[1] * p[k]) ** 2;
  return rest <= 1e-26 * norm ? ratio : null;
}

/** The measure of A seen from `start`, times start^T start; null where the recursion breaks down. */
function wholeMeasure(
  a: SparseComplex,
  start: ComplexArray,
  counts: { products: number },
  onStep: (fraction: number) => void,
): SpectralMeasure | null {
  const weight = selfProduct(start);
  if (!(Math.hypot(...weight) > BREAKDOWN * length(start) ** 2)) return null;
  const n = a.size;
  const found = withKernels(2 * n * (n + 6), (workspace) => {
    const recursion = new Recursion(a, start, squareRoot(weight), workspace);
    recursion.complete(counts, onStep);
    return recursion.measure();
  });
  if (!found) return null;
  const [re, im] = weight;
  for (let k = 0; k < found.weightReal.length; k++) {
    const own = found.weightReal[k];
    found.weightReal[k] = re * own - im * found.weightImag[k];
    found.weightImag[k] = re * found.weightImag[k] + im * own;
  }
  return found;
}

/** The growing tridiagonal matrix and the vectors behind it, which stand in the kernels' memory, real parts before imaginary ones. */
class Recursion {
  steps = 0;
  state: 'running' | 'closed' | 'broken' = 'running';
  private readonly n: number;
  private readonly diagonal: ComplexArray;
  private readonly beside: ComplexArray;
  private readonly basis: Slab;
  private readonly next: SplitVector;
  /** Room for what is needed to take products of the basis with `next`, and for these. */
  private readonly forReal: Slab;
  private readonly forImag: Slab;
  private readonly real: Slab;
  private readonly imag: Slab;
  private readonly kernels: Kernels;
  private readonly loss: OrthogonalityLoss;
  /** Vectors still to be made orthogonal: two in a row, as each follows from the two before it. */
  private restoring = 0;

  constructor(
    private readonly a: SparseComplex,
    start: ComplexArray,
    norm: [number, number],
    { kernels, take }: KernelWorkspace,
  ) {
    const n = a.size;
    this.n = n;
    this.kernels = kernels;
    this.basis = take(2 * n * n);
    [this.forReal, this.forImag] = [take(2 * n), take(2 * n)];
    [this.real, this.imag] = [take(n), take(n)];
    this.next = split(take(2 * n), n);
    this.diagonal = complexArray(n);
    this.beside = complexArray(n);
    this.loss = new OrthogonalityLoss(n);
    divideInto(this.vector(0), start, norm);
  }

  /** Runs until the space is closed or the recursion breaks down. */
  complete(counts: { products: number }, onStep: (fraction: number) => void): void {
    while (this.state === 'running') {
      this.advance();
      counts.products++;
      onStep((this.steps / this.n) ** 2);
    }
  }

  private advance(): void {
    const { a, steps, next, n } = this;
    const current = this.vector(steps);
    applySparseInto(next, a, current);
    const size = length(next);
    [this.diagonal.real[steps], this.diagonal.imag[steps]] = product(current, next);
    for (let k = steps; k >= Math.max(0, steps - 1); k--) {
      const q = this.vector(k);
      subtract(next, q, ...product(q, next));
    }
    const square = this.keepOrthogonal(size);
    this.steps++;
    const rest = length(next);
    if (rest <= CLOSED * size || this.steps === n) this.state = 'closed';
    else if (!(Math.hypot(...square) > BREAKDOWN * rest * rest)) this.state = 'broken';
    else {
      const root = squareRoot(square);
      [this.beside.real[steps], this.beside.imag[steps]] = root;
      divideInto(this.vector(this.steps), next, root);
    }
  }

  /** null where something went wrong: the recursion, the diagonalisation, or eigenvalues that grow. */
  measure(rotations?: Rotations): SpectralMeasure | null {
    if (this.state === 'broken') return null;
    const found = spectralMeasure(this.steps, this.diagonal, this.beside, rotations);
    if (!found) return null;
    const radius = found.real.reduce((most, x, k) => Math.max(most, Math.abs(x) + Math.abs(found.imag[k])), 0);
    return found.real.every((x) => x <= GROWTH * radius) ? found : null;
  }

  /** f(A) of the first vector. */
  apply(f: EigenFunction): ComplexArray | null {
    const rotations = new Rotations();
    const found = this.measure(rotations);
    if (!found) return null;
    const [real, imag] = [found.rowReal, found.rowImag];
    for (let k = 0; k < this.steps; k++) {
      const [fr, fi] = f(found.real[k], found.imag[k]);
      const re = real[k];
      real[k] = fr * re - fi * imag[k];
      imag[k] = fr * imag[k] + fi * re;
    }
    rotations.apply(real, imag);
    const out = complexArray(this.n);
    for (let k = 0; k < this.steps; k++) subtract(out, this.vector(k), -real[k], -imag[k]);
    return out;
  }

  private vector(k: number): ComplexArray {
    const first = 2 * this.n * k;
    const { data } = this.basis;
    return { real: data.subarray(first, first + this.n), imag: data.subarray(first + this.n, first + 2 * this.n) };
  }

  /**
   * Makes the next vector orthogonal to all before it when that is due; gives its product with itself. A vector that is short beside
   * |A q| = `size` is what rounding left of a cancellation, and needs that twice (B. N. Parlett, The Symmetric Eigenvalue Problem,
   * 1980, section 6.9).
   */
  private keepOrthogonal(size: number): [number, number] {
    const { steps, next, diagonal, beside, loss } = this;
    const square = selfProduct(next);
    if (loss.advance(steps, diagonal, beside, squareRoot(square)) > MOST_OVERLAP) this.restoring = 2;
    const short = length(next) < CANCELLED * size;
    if (short) this.restoring = 2;
    if (this.restoring === 0) return square;
    this.restoring--;
    this.removeOlder(steps + 1);
    if (short) this.removeOlder(steps + 1);
    loss.restored(steps + 1);
    return selfProduct(next);
  }

  /** Takes off what rounding has put along basis vectors 0..count-1. */
  private removeOlder(count: number): void {
    const { kernels, n, basis, next, forReal, forImag, real, imag } = this;
    // Re q^T w = (qr, qi).(wr, -wi) and Im q^T w = (qr, qi).(wi, wr)
    forReal.data.set(next.real);
    for (let k = 0; k < n; k++) forReal.data[n + k] = -next.imag[k];
    forImag.data.set(next.imag);
    forImag.data.set(next.real, n);
    kernels.dotRows(count, 2 * n, basis.at, 16 * n, forReal.at, real.at);
    kernels.dotRows(count, 2 * n, basis.at, 16 * n, forImag.at, imag.at);
    kernels.scale(count, -1, real.at);
    // w -= (hr + i hi)(qr + i qi): the real factors go straight onto w, the imaginary ones by way of scratch.
    kernels.addRows(count, 2 * n, basis.at, 16 * n, real.at, next.at);
    forReal.data.fill(0);
    kernels.addRows(count, 2 * n, basis.at, 16 * n, imag.at, forReal.at);
    for (let k = 0; k < n; k++) {
      next.real[k] += forReal.data[n + k];
      next.imag[k] -= forReal.data[k];
    }
  }
}

/** A complex vector in the kernels' memory. */
interface SplitVector extends ComplexArray {
  readonly at: number;
}

function split({ at, data }: Slab, n: number): SplitVector {
  return { at, real: data.subarray(0, n), imag: data.subarray(n, 2 * n) };
}

/** Samples kept up by multiplication before an exponential is taken anew. */
const RENEWED = 256;

/** out_k += factor sum of weight exp(value k dwell). */
function addSignal(
  out: ComplexArray,
  measure: SpectralMeasure,
  [fr, fi]: [number, number],
  { dwell, points }: Sampling,
): void {
  const { real, imag, weightReal, weightImag } = measure;
  const whole = weightReal.reduce((sum, w, k) => sum + Math.hypot(w, weightImag[k]), 0);
  for (let j = 0; j < real.length; j++) {
    if (Math.hypot(weightReal[j], weightImag[j]) < FAINT * whole) continue;
    const wr = fr * weightReal[j] - fi * weightImag[j];
    const wi = fr * weightImag[j] + fi * weightReal[j];
    const step = Math.exp(real[j] * dwell);
    const [cr, ci] = [step * Math.cos(imag[j] * dwell), step * Math.sin(imag[j] * dwell)];
    for (let first = 0; first < points; first += RENEWED) {
      const size = Math.exp(real[j] * dwell * first);
      const angle = imag[j] * dwell * first;
      let xr = size * (wr * Math.cos(angle) - wi * Math.sin(angle));
      let xi = size * (wr * Math.sin(angle) + wi * Math.cos(angle));
      const end = Math.min(points, first + RENEWED);
      for (let k = first; k < end; k++) {
        out.real[k] += xr;
        out.imag[k] += xi;
        const turned = xr * cr - xi * ci;
        xi = xr * ci + xi * cr;
        xr = turned;
      }
    }
  }
}

function complexArray(size: number): ComplexArray {
  return { real: new Float64Array(size), imag: new Float64Array(size) };
}

/** x^T y */
function product(x: ComplexArray, y: ComplexArray): [number, number] {
  let [re, im] = [0, 0];
  for (let k = 0; k < x.real.length; k++) {
    re += x.real[k] * y.real[k] - x.imag[k] * y.imag[k];
    im += x.real[k] * y.imag[k] + x.imag[k] * y.real[k];
  }
  return [re, im];
}

function selfProduct(x: ComplexArray): [number, number] {
  return product(x, x);
}

/** Euclidean length. */
function length({ real, imag }: ComplexArray): number {
  let sum = 0;
  for (let k = 0; k < real.length; k++) sum += real[k] * real[k];
  for (let k = 0; k < imag.length; k++) sum += imag[k] * imag[k];
  return Math.sqrt(sum);
}

/** w -= (re + i im) q */
function subtract(w: ComplexArray, q: ComplexArray, re: number, im: number): void {
  for (let k = 0; k < w.real.length; k++) {
    w.real[k] -= re * q.real[k] - im * q.imag[k];
    w.imag[k] -= re * q.imag[k] + im * q.real[k];
  }
}

/** out = w/(re + i im) */
function divideInto(out: ComplexArray, w: ComplexArray, [re, im]: [number, number]): void {
  const size = re * re + im * im;
  for (let k = 0; k < w.real.length; k++) {
    const [x, y] = [w.real[k], w.imag[k]];
    out.real[k] = (x * re + y * im) / size;
    out.imag[k] = (y * re - x * im) / size;
  }
}

function squareRoot([re, im]: [number, number]): [number, number] {
  const size = Math.hypot(re, im);
  const root = Math.sqrt((size + Math.abs(re)) / 2);
  if (root === 0) return [0, 0];
  const other = im / (2 * root);
  return re >= 0 ? [root, other] : [Math.abs(other), im >= 0 ? root : -root];
}
