import FFT from 'fft.js';
import type { ComplexArray } from '../run/solved.js';

/**
 * X_j = sum_k x_k exp(sign 2 pi i j k / n), unscaled, for any length n >= 1. Powers of two go straight to fft.js, other
 * lengths through the chirp transform of L. I. Bluestein, IEEE Trans. Audio Electroacoust. 18, 451 (1970).
 */
export function fourier(x: ComplexArray, sign: 1 | -1): ComplexArray {
  const n = x.real.length;
  return isPowerOfTwo(n) ? powerOfTwo(x, sign) : chirp(x, sign);
}

/** The first `count` <= n/2 of X_j = sum_k x_k exp(2 pi i j k / n) of real numbers, n a power of two above 1. */
export function fourierOfReal(x: Float64Array, count: number): ComplexArray {
  const n = x.length;
  const output = new Float64Array(2 * n);
  planOf(n).realTransform(output, x);
  const real = new Float64Array(count);
  const imag = new Float64Array(count);
  for (let j = 0; j < count; j++) {
    real[j] = output[2 * j];
    imag[j] = -output[2 * j + 1];
  }
  return { real, imag };
}

/** Whether n is 1, 2, 4, 8 ... */
export function isPowerOfTwo(n: number): boolean {
  return n > 0 && (n & (n - 1)) === 0;
}

function powerOfTwo(x: ComplexArray, sign: 1 | -1): ComplexArray {
  const n = x.real.length;
  if (n === 1) return { real: x.real.slice(), imag: x.imag.slice() };
  const transform = planOf(n);
  const input = new Float64Array(2 * n);
  // The +i transform is the -i transform with real and imaginary parts exchanged on both sides.
  const [first, second] = sign < 0 ? [x.real, x.imag] : [x.imag, x.real];
  for (let k = 0; k < n; k++) {
    input[2 * k] = first[k];
    input[2 * k + 1] = second[k];
  }
  const output = new Float64Array(2 * n);
  transform.transform(output, input);
  const a = new Float64Array(n);
  const b = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    a[k] = output[2 * k];
    b[k] = output[2 * k + 1];
  }
  return sign < 0 ? { real: a, imag: b } : { real: b, imag: a };
}

/** Transforms by length, each with its table of roots. Lengths are powers of two, so they are few. */
const PLANS = new Map<number, FFT>();

function planOf(n: number): FFT {
  const plan = PLANS.get(n) ?? new FFT(n);
  PLANS.set(n, plan);
  return plan;
}

/** With w_k = exp(sign pi i k^2/n): X_j = w_j sum_k (x_k w_k) conj(w_{j-k}), a convolution of a power-of-two length. */
function chirp(x: ComplexArray, sign: 1 | -1): ComplexArray {
  const n = x.real.length;
  let size = 1;
  while (size < 2 * n - 1) size *= 2;
  const cos = new Float64Array(n);
  const sin = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    // k^2 modulo 2n keeps the angle small and exact.
    const angle = (Math.PI * ((k * k) % (2 * n))) / n;
    cos[k] = Math.cos(angle);
    sin[k] = sign * Math.sin(angle);
  }
  const a = { real: new Float64Array(size), imag: new Float64Array(size) };
  const b = { real: new Float64Array(size), imag: new Float64Array(size) };
  for (let k = 0; k < n; k++) {
    a.real[k] = x.real[k] * cos[k] - x.imag[k] * sin[k];
    a.imag[k] = x.real[k] * sin[k] + x.imag[k] * cos[k];
    for (const place of k === 0 ? [0] : [k, size - k]) {
      b.real[place] = cos[k];
      b.imag[place] = -sin[k];
    }
  }
  const [fa, fb] = [powerOfTwo(a, -1), powerOfTwo(b, -1)];
  for (let k = 0; k < size; k++) {
    const re = fa.real[k] * fb.real[k] - fa.imag[k] * fb.imag[k];
    fa.imag[k] = fa.real[k] * fb.imag[k] + fa.imag[k] * fb.real[k];
    fa.real[k] = re;
  }
  const c = powerOfTwo(fa, 1);
  const out = { real: new Float64Array(n), imag: new Float64Array(n) };
  for (let j = 0; j < n; j++) {
    const [re, im] = [c.real[j] / size, c.imag[j] / size];
    out.real[j] = re * cos[j] - im * sin[j];
    out.imag[j] = re * sin[j] + im * cos[j];
  }
  return out;
}
