import { withKernels } from './kernels.js';

/** out_ij = sum_k a_ik b_jk: a is m x k, b is n x k, out m x n, all row-major. Returns a new array. */
export function productWithTransposed(a: Float64Array, b: Float64Array, m: number, n: number, k: number): Float64Array {
  if (m * n * k < SMALL) return plainProduct(a, b, m, n, k);
  return withKernels(m * k + n * k + m * n, ({ kernels, scratch, take }) => {
    const left = take(m * k);
    const right = take(n * k);
    const out = take(m * n);
    left.data.set(a.subarray(0, m * k));
    right.data.set(b.subarray(0, n * k));
    out.data.fill(0);
    kernels.addProduct(m, n, k, 1, left.at, 8 * k, 8, right.at, 8, 8 * k, out.at, 8 * n, scratch);
    return out.data.slice();
  });
}

/** Multiplications below which copying to the kernels' memory costs more than it saves. Found by trial; not derived. */
const SMALL = 20_000;

function plainProduct(a: Float64Array, b: Float64Array, m: number, n: number, k: number): Float64Array {
  const out = new Float64Array(m * n);
  for (let i = 0, o = 0; i < m; i++) {
    for (let j = 0; j < n; j++, o++) {
      let sum = 0;
      for (let l = 0, p = i * k, q = j * k; l < k; l++) sum += a[p++] * b[q++];
      out[o] = sum;
    }
  }
  return out;
}
