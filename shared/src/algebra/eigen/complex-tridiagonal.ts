/**
 * Eigenvalues of a complex symmetric tridiagonal matrix T = X diag(values) X^T, X^T X = 1, and the squares of the first row of X, by
 * the QL algorithm with implicit shifts and complex orthogonal rotations (J. K. Cullum and R. A. Willoughby, Lanczos Algorithms for
 * Large Symmetric Eigenvalue Computations, 1985, ch. 6). Rotations of that kind can break down, and T need not have such an X:
 * then the result is null.
 */
export interface SpectralMeasure {
  readonly real: Float64Array;
  readonly imag: Float64Array;
  /** e1^T f(T) e1 = sum of weight times f(value). */
  readonly weightReal: Float64Array;
  readonly weightImag: Float64Array;
  /** First row of X, whose squares the weights are. */
  readonly rowReal: Float64Array;
  readonly rowImag: Float64Array;
}

/** The rotations that made X = G1 G2 ..., in that order: rotation k turns rows `row` and `row + 1`, four numbers each in `values`. */
export class Rotations {
  private rows = new Uint32Array(1024);
  private values = new Float64Array(4096);
  private count = 0;

  push(row: number, cosineReal: number, cosineImag: number, sineReal: number, sineImag: number): void {
    if (this.count === this.rows.length) {
      const [rows, values] = [new Uint32Array(2 * this.count), new Float64Array(8 * this.count)];
      rows.set(this.rows);
      values.set(this.values);
      [this.rows, this.values] = [rows, values];
    }
    this.rows[this.count] = row;
    const at = 4 * this.count++;
    this.values[at] = cosineReal;
    this.values[at + 1] = cosineImag;
    this.values[at + 2] = sineReal;
    this.values[at + 3] = sineImag;
  }

  /** u <- X u */
  apply(real: Float64Array, imag: Float64Array): void {
    for (let k = this.count - 1; k >= 0; k--) {
      const i = this.rows[k];
      const [cr, ci, sr, si] = this.values.subarray(4 * k, 4 * k + 4);
      const [xr, xi, yr, yi] = [real[i], imag[i], real[i + 1], imag[i + 1]];
      real[i] = cr * xr - ci * xi + sr * yr - si * yi;
      imag[i] = cr * xi + ci * xr + sr * yi + si * yr;
      real[i + 1] = cr * yr - ci * yi - sr * xr + si * xi;
      imag[i + 1] = cr * yi + ci * yr - sr * xi - si * xr;
    }
  }
}

const ROUNDING = 2 ** -52;
/** A rotation whose f^2 + g^2 cancels to this part of its terms has lost half of the figures. */
const BREAKDOWN = 1e-8;
const MOST_SWEEPS = 60;

/** Diagonal `d` (m) and off-diagonal `e` (at least m - 1) are left as they are; `rotations` collects what makes X. */
export function spectralMeasure(
  m: number,
  d: { readonly real: Float64Array; readonly imag: Float64Array },
  e: { readonly real: Float64Array; readonly imag: Float64Array },
  rotations?: Rotations,
): SpectralMeasure | null {
  const [dr, di] = [d.real.slice(0, m), d.imag.slice(0, m)];
  const [er, ei] = [new Float64Array(m), new Float64Array(m)];
  er.set(e.real.subarray(0, m - 1));
  ei.set(e.imag.subarray(0, m - 1));
  const [zr, zi] = [new Float64Array(m), new Float64Array(m)];
  zr[0] = 1;
  for (let l = 0; l < m; l++) {
    for (let sweep = 0; ; sweep++) {
      const last = endOfBlock(l, m, dr, di, er, ei);
      if (last === l) break;
      if (sweep === MOST_SWEEPS || !qlSweep(l, last, dr, di, er, ei, zr, zi, rotations)) return null;
    }
  }
  const [weightReal, weightImag] = [new Float64Array(m), new Float64Array(m)];
  for (let k = 0; k < m; k++) {
    weightReal[k] = zr[k] * zr[k] - zi[k] * zi[k];
    weightImag[k] = 2 * zr[k] * zi[k];
  }
  return { real: dr, imag: di, weightReal, weightImag, rowReal: zr, rowImag: zi };
}

/** First row from l on whose off-diagonal element is rounding. */
function endOfBlock(
  l: number,
  m: number,
  dr: Float64Array,
  di: Float64Array,
  er: Float64Array,
  ei: Float64Array,
): number {
  let last = l;
  while (last < m - 1) {
    const size = Math.abs(dr[last]) + Math.abs(di[last]) + Math.abs(dr[last + 1]) + Math.abs(di[last + 1]);
    if (Math.abs(er[last]) + Math.abs(ei[last]) <= ROUNDING * size) break;
    last++;
  }
  return last;
}

/** One implicit QL step on rows l..last; false where a rotation breaks down. */
function qlSweep(
  l: number,
  last: number,
  dr: Float64Array,
  di: Float64Array,
  er: Float64Array,
  ei: Float64Array,
  zr: Float64Array,
  zi: Float64Array,
  rotations?: Rotations,
): boolean {
  // Shift: the eigenvalue of the leading 2 x 2 block next to d_l.
  const root = { re: 0, im: 0 };
  const esize = er[l] * er[l] + ei[l] * ei[l];
  const [xr, xi] = [(dr[l + 1] - dr[l]) / 2, (di[l + 1] - di[l]) / 2];
  let gr = (xr * er[l] + xi * ei[l]) / esize;
  let gi = (xi * er[l] - xr * ei[l]) / esize;
  squareRoot(gr * gr - gi * gi + 1, 2 * gr * gi, root);
  const sign = gr * root.re + gi * root.im >= 0 ? 1 : -1;
  const [qr, qi] = [gr + sign * root.re, gi + sign * root.im];
  const qsize = qr * qr + qi * qi;
  gr = dr[last] - dr[l] + (er[l] * qr + ei[l] * qi) / qsize;
  gi = di[last] - di[l] + (ei[l] * qr - er[l] * qi) / qsize;
  let [sr, si, cr, ci, pr, pi] = [1, 0, 1, 0, 0, 0];
  for (let i = last - 1; i >= l; i--) {
    const fr = sr * er[i] - si * ei[i];
    const fi = sr * ei[i] + si * er[i];
    const br = cr * er[i] - ci * ei[i];
    const bi = cr * ei[i] + ci * er[i];
    squareRoot(fr * fr - fi * fi + gr * gr - gi * gi, 2 * (fr * fi + gr * gi), root);
    const rsize = root.re * root.re + root.im * root.im;
    if (!(rsize > BREAKDOWN * (fr * fr + fi * fi + gr * gr + gi * gi))) return false;
    er[i + 1] = root.re;
    ei[i + 1] = root.im;
    sr = (fr * root.re + fi * root.im) / rsize;
    si = (fi * root.re - fr * root.im) / rsize;
    cr = (gr * root.re + gi * root.im) / rsize;
    ci = (gi * root.re - gr * root.im) / rsize;
    gr = dr[i + 1] - pr;
    gi = di[i + 1] - pi;
    const [ur, ui] = [dr[i] - gr, di[i] - gi];
    const tr = ur * sr - ui * si + 2 * (cr * br - ci * bi);
    const ti = ur * si + ui * sr + 2 * (cr * bi + ci * br);
    pr = sr * tr - si * ti;
    pi = sr * ti + si * tr;
    dr[i + 1] = gr + pr;
    di[i + 1] = gi + pi;
    gr = cr * tr - ci * ti - br;
    gi = cr * ti + ci * tr - bi;
    rotations?.push(i, cr, ci, sr, si);
    const [hr, hi, kr, ki] = [zr[i + 1], zi[i + 1], zr[i], zi[i]];
    zr[i + 1] = sr * kr - si * ki + cr * hr - ci * hi;
    zi[i + 1] = sr * ki + si * kr + cr * hi + ci * hr;
    zr[i] = cr * kr - ci * ki - sr * hr + si * hi;
    zi[i] = cr * ki + ci * kr - sr * hi - si * hr;
  }
  dr[l] -= pr;
  di[l] -= pi;
  er[l] = gr;
  ei[l] = gi;
  er[last] = 0;
  ei[last] = 0;
  return true;
}

/** Principal square root of re + i im, into `out`. */
function squareRoot(re: number, im: number, out: { re: number; im: number }): void {
  const size = Math.sqrt(re * re + im * im);
  if (size === 0) out.re = out.im = 0;
  else if (re >= 0) {
    out.re = Math.sqrt((size + re) / 2);
    out.im = im / (2 * out.re);
  } else {
    out.im = im >= 0 ? Math.sqrt((size - re) / 2) : -Math.sqrt((size - re) / 2);
    out.re = im / (2 * out.im);
  }
}
