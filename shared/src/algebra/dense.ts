/**
 * Dense matrices, real and complex.
 *   storage   row-major: entry (i, j) of a rows × columns matrix is data[i * columns + j]; complex matrices keep the
 *             real and the imaginary parts apart
 *   doors     the plain form allocates its result; the `Into` form writes to `out`, which must not alias an input
 * Shapes that do not fit throw a RangeError.
 */
export interface RealMatrix {
  readonly rows: number;
  readonly columns: number;
  readonly data: Float64Array;
}

export interface ComplexMatrix {
  readonly rows: number;
  readonly columns: number;
  readonly real: Float64Array;
  readonly imag: Float64Array;
}

/** A real matrix over `data` (kept, not copied), zero if it is left out. */
export function realMatrix(
  rows: number,
  columns: number,
  data: Float64Array = new Float64Array(rows * columns),
): RealMatrix {
  requireShape(data.length === rows * columns, `${rows} x ${columns} matrix over ${data.length} numbers`);
  return { rows, columns, data };
}

/** A complex matrix over `real` and `imag` (kept, not copied), zero where they are left out. */
export function complexMatrix(
  rows: number,
  columns: number,
  real: Float64Array = new Float64Array(rows * columns),
  imag: Float64Array = new Float64Array(rows * columns),
): ComplexMatrix {
  const size = rows * columns;
  requireShape(real.length === size && imag.length === size, `${rows} x ${columns} matrix over ${real.length} numbers`);
  return { rows, columns, real, imag };
}

export function complexIdentity(n: number): ComplexMatrix {
  const out = complexMatrix(n, n);
  for (let i = 0; i < n; i++) out.real[i * n + i] = 1;
  return out;
}

/** a b */
export function multiply(a: RealMatrix, b: RealMatrix): RealMatrix {
  return multiplyInto(realMatrix(a.rows, b.columns), a, b);
}

/** out = a b */
export function multiplyInto(out: RealMatrix, a: RealMatrix, b: RealMatrix): RealMatrix {
  requireProduct(out, a, b);
  out.data.fill(0);
  addProduct(out.data, a.data, b.data, a, b.columns, 1);
  return out;
}

/** a b of complex matrices */
export function multiplyComplex(a: ComplexMatrix, b: ComplexMatrix): ComplexMatrix {
  return multiplyComplexInto(complexMatrix(a.rows, b.columns), a, b);
}

/** out = a b of complex matrices, as four real products */
export function multiplyComplexInto(out: ComplexMatrix, a: ComplexMatrix, b: ComplexMatrix): ComplexMatrix {
  requireProduct(out, a, b);
  out.real.fill(0);
  out.imag.fill(0);
  addProduct(out.real, a.real, b.real, a, b.columns, 1);
  addProduct(out.real, a.imag, b.imag, a, b.columns, -1);
  addProduct(out.imag, a.real, b.imag, a, b.columns, 1);
  addProduct(out.imag, a.imag, b.real, a, b.columns, 1);
  return out;
}

/** out += scale · a */
export function addScaledInto(out: ComplexMatrix, a: ComplexMatrix, scale: number): ComplexMatrix {
  requireShape(out.rows === a.rows && out.columns === a.columns, 'sum of matrices of different shapes');
  for (let p = 0; p < a.real.length; p++) {
    out.real[p] += scale * a.real[p];
    out.imag[p] += scale * a.imag[p];
  }
  return out;
}

/** Conjugate transpose. */
export function adjoint(a: ComplexMatrix): ComplexMatrix {
  const out = complexMatrix(a.columns, a.rows);
  for (let i = 0, p = 0; i < a.rows; i++) {
    for (let j = 0; j < a.columns; j++, p++) {
      out.real[j * a.rows + i] = a.real[p];
      out.imag[j * a.rows + i] = -a.imag[p];
    }
  }
  return out;
}

/** Sum of the diagonal of a square matrix, as [real, imaginary]. */
export function trace(a: ComplexMatrix): [real: number, imag: number] {
  requireShape(a.rows === a.columns, `trace of a ${a.rows} x ${a.columns} matrix`);
  let real = 0;
  let imag = 0;
  for (let p = 0; p < a.real.length; p += a.columns + 1) {
    real += a.real[p];
    imag += a.imag[p];
  }
  return [real, imag];
}

/** Kronecker product a ⊗ b: the indices of `a` vary slowest. */
export function kron(a: ComplexMatrix, b: ComplexMatrix): ComplexMatrix {
  const out = complexMatrix(a.rows * b.rows, a.columns * b.columns);
  for (let i = 0, p = 0; i < out.rows; i++) {
    const rowA = Math.floor(i / b.rows) * a.columns;
    const rowB = (i % b.rows) * b.columns;
    for (let j = 0; j < a.columns; j++) {
      const re = a.real[rowA + j];
      const im = a.imag[rowA + j];
      for (let k = rowB; k < rowB + b.columns; k++, p++) {
        out.real[p] = re * b.real[k] - im * b.imag[k];
        out.imag[p] = re * b.imag[k] + im * b.real[k];
      }
    }
  }
  return out;
}

/** out += sign · a b, all row-major; a is shape.rows × shape.columns, b has `columns` columns. */
function addProduct(
  out: Float64Array,
  a: Float64Array,
  b: Float64Array,
  shape: { rows: number; columns: number },
  columns: number,
  sign: number,
): void {
  for (let i = 0, p = 0; i < shape.rows; i++) {
    const row = i * columns;
    for (let k = 0; k < shape.columns; k++, p++) {
      const factor = sign * a[p];
      if (factor === 0) continue;
      for (let j = 0, q = k * columns; j < columns; j++, q++) out[row + j] += factor * b[q];
    }
  }
}

interface Shape {
  readonly rows: number;
  readonly columns: number;
}

function requireProduct(out: Shape, a: Shape, b: Shape): void {
  const fits = a.columns === b.rows && out.rows === a.rows && out.columns === b.columns;
  requireShape(fits, `(${out.rows} x ${out.columns}) = (${a.rows} x ${a.columns})(${b.rows} x ${b.columns})`);
}

function requireShape(fits: boolean, what: string): void {
  if (!fits) throw new RangeError(`Shapes do not fit: ${what}`);
}
