import type { ComplexArray } from '../run/solved.js';
import { spectralMeasure, type SpectralMeasure } from './eigen/complex-tridiagonal.js';
import { applySparseInto, type SparseComplex } from './sparse.js';

/**
 * Signals p^T exp(A t) v of a large sparse complex symmetric A by Lanczos recursion with the product x^T y (G. Moro and J. H.
 * Freed, J. Chem. Phys. 74 (1981) 3757): A Q = Q T with T tridiagonal and Q^T Q = 1, so that q^T exp(A t) q = e1^T exp(T t) e1 for
 * all times at once. Every vector is made orthogonal to all before it, so that the recursion ends with the size of A at the latest.
 */
export interface Sampling {
  readonly dwell: number;
  readonly points: number;
}

/** x^T x below this part of |x|^2 has lost its figures. */
const BREAKDOWN = 1e-10;
/** Overlaps below this beside |A q| stay: orthogonality to about the square root of rounding is enough (H. D. Simon, Math. Comput. 42 (1984) 115). */
const ROUNDING = 1e-12;
/** A new direction this short beside A q is rounding. */
const CLOSED = 1e-13;
/** Weights below this part of the whole are left out. */
const FAINT = 1e-15;

/**
 * p^T exp(A k dwell) v for k = 0..points-1; null where the recursion breaks down, so that another method must serve. Where v is not
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

/** The measure of A seen from `start`, times start^T start. */
function wholeMeasure(
  a: SparseComplex,
  start: ComplexArray,
  counts: { products: number },
  onStep: (fraction: number) => void,
): SpectralMeasure | null {
  const recursion = new Recursion(a, start);
  while (recursion.state === 'running') {
    recursion.advance();
    counts.products++;
    onStep((recursion.steps / a.size) ** 2);
  }
  return recursion.state === 'broken' ? null : recursion.measure();
}

/** The growing tridiagonal matrix and the vectors behind it. */
class Recursion {
  steps = 0;
  state: 'running' | 'closed' | 'broken' = 'running';
  private readonly diagonal: ComplexArray;
  private readonly beside: ComplexArray;
  private readonly basis: ComplexArray[] = [];
  private readonly next: ComplexArray;
  private readonly weight: [number, number];

  constructor(
    private readonly a: SparseComplex,
    start: ComplexArray,
  ) {
    this.next = complexArray(a.size);
    this.diagonal = complexArray(a.size);
    this.beside = complexArray(a.size);
    this.weight = selfProduct(start);
    if (!(Math.hypot(...this.weight) > BREAKDOWN * length(start) ** 2)) this.state = 'broken';
    else this.basis.push(quotient(start, squareRoot(this.weight)));
  }

  advance(): void {
    const { a, steps, basis, next } = this;
    applySparseInto(next, a, basis[steps]);
    const size = length(next);
    [this.diagonal.real[steps], this.diagonal.imag[steps]] = product(basis[steps], next);
    for (let k = steps; k >= Math.max(0, steps - 1); k--) subtract(next, basis[k], ...product(basis[k], next));
    removeOlder(next, basis, steps - 1, ROUNDING * size);
    this.steps++;
    const rest = length(next);
    const square = selfProduct(next);
    if (rest <= CLOSED * size || this.steps === a.size) this.state = 'closed';
    else if (!(Math.hypot(...square) > BREAKDOWN * rest * rest)) this.state = 'broken';
    else {
      const root = squareRoot(square);
      [this.beside.real[steps], this.beside.imag[steps]] = root;
      basis.push(quotient(next, root));
    }
  }

  /** Weights times start^T start; null where T can't be diagonalised. */
  measure(): SpectralMeasure | null {
    const found = spectralMeasure(this.steps, this.diagonal, this.beside);
    if (!found) return null;
    const [re, im] = this.weight;
    for (let k = 0; k < this.steps; k++) {
      const weight = found.weightReal[k];
      found.weightReal[k] = re * weight - im * found.weightImag[k];
      found.weightImag[k] = re * found.weightImag[k] + im * weight;
    }
    return found;
  }
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

/** Takes off what rounding has put along basis vectors 0..end-1 where that is more than `least`; pairs of vectors at a time. */
function removeOlder(w: ComplexArray, basis: readonly ComplexArray[], end: number, least: number): void {
  const [wr, wi] = [w.real, w.imag];
  for (let j = 0; j < end; j += 2) {
    const [a, b] = [basis[j], basis[Math.min(j + 1, end - 1)]];
    const [ar, ai, br, bi] = [a.real, a.imag, b.real, b.imag];
    let [pr, pi, qr, qi] = [0, 0, 0, 0];
    for (let k = 0; k < wr.length; k++) {
      const x = wr[k];
      const y = wi[k];
      pr += ar[k] * x - ai[k] * y;
      pi += ar[k] * y + ai[k] * x;
      qr += br[k] * x - bi[k] * y;
      qi += br[k] * y + bi[k] * x;
    }
    if (Math.abs(pr) + Math.abs(pi) > least) subtract(w, a, pr, pi);
    if (b !== a && Math.abs(qr) + Math.abs(qi) > least) subtract(w, b, qr, qi);
  }
}

/** w -= (re + i im) q */
function subtract(w: ComplexArray, q: ComplexArray, re: number, im: number): void {
  for (let k = 0; k < w.real.length; k++) {
    w.real[k] -= re * q.real[k] - im * q.imag[k];
    w.imag[k] -= re * q.imag[k] + im * q.real[k];
  }
}

/** w/(re + i im) */
function quotient(w: ComplexArray, [re, im]: [number, number]): ComplexArray {
  const size = re * re + im * im;
  return {
    real: w.real.map((x, k) => (x * re + w.imag[k] * im) / size),
    imag: w.imag.map((x, k) => (x * re - w.real[k] * im) / size),
  };
}

function squareRoot([re, im]: [number, number]): [number, number] {
  const size = Math.hypot(re, im);
  const root = Math.sqrt((size + Math.abs(re)) / 2);
  if (root === 0) return [0, 0];
  const other = im / (2 * root);
  return re >= 0 ? [root, other] : [Math.abs(other), im >= 0 ? root : -root];
}
