/**
 * Vector and matrix kernels on double precision numbers, in AssemblyScript, compiled to WebAssembly with 128-bit SIMD.
 *   pointers  byte addresses in the module's memory; vectors are contiguous
 *   ld        distance of two rows in BYTES; counts are numbers of doubles
 * The callers own the memory; nothing is kept between calls.
 */

/** sum of x_i y_i */
export function dot(n: i32, x: usize, y: usize): f64 {
  let s0 = f64x2.splat(0);
  let s1 = f64x2.splat(0);
  let i = 0;
  for (; i + 4 <= n; i += 4, x += 32, y += 32) {
    s0 = f64x2.add(s0, f64x2.mul(v128.load(x), v128.load(y)));
    s1 = f64x2.add(s1, f64x2.mul(v128.load(x, 16), v128.load(y, 16)));
  }
  let sum = across(f64x2.add(s0, s1));
  for (; i < n; i++, x += 8, y += 8) sum += load<f64>(x) * load<f64>(y);
  return sum;
}

/** x <- factor x */
export function scale(n: i32, factor: f64, x: usize): void {
  const f = f64x2.splat(factor);
  let i = 0;
  for (; i + 2 <= n; i += 2, x += 16) v128.store(x, f64x2.mul(f, v128.load(x)));
  if (i < n) store<f64>(x, factor * load<f64>(x));
}

/** Rows (x, y) <- (cosine x + sine y, cosine y - sine x) */
export function rotate(n: i32, x: usize, y: usize, cosine: f64, sine: f64): void {
  const c = f64x2.splat(cosine);
  const s = f64x2.splat(sine);
  let i = 0;
  for (; i + 2 <= n; i += 2, x += 16, y += 16) {
    const p = v128.load(x);
    const q = v128.load(y);
    v128.store(x, f64x2.add(f64x2.mul(c, p), f64x2.mul(s, q)));
    v128.store(y, f64x2.sub(f64x2.mul(c, q), f64x2.mul(s, p)));
  }
  if (i < n) {
    const p = load<f64>(x);
    const q = load<f64>(y);
    store<f64>(x, cosine * p + sine * q);
    store<f64>(y, cosine * q - sine * p);
  }
}

/** out_r = row_r . x for `rows` rows of n numbers */
export function dotRows(rows: i32, n: i32, a: usize, ld: usize, x: usize, out: usize): void {
  let r = 0;
  for (; r + 4 <= rows; r += 4, a += 4 * ld, out += 32) {
    const a1 = a + ld;
    const a2 = a1 + ld;
    const a3 = a2 + ld;
    let s0 = f64x2.splat(0);
    let s1 = f64x2.splat(0);
    let s2 = f64x2.splat(0);
    let s3 = f64x2.splat(0);
    const whole = <usize>(n & ~1) << 3;
    for (let o: usize = 0; o < whole; o += 16) {
      const v = v128.load(x + o);
      s0 = f64x2.add(s0, f64x2.mul(v128.load(a + o), v));
      s1 = f64x2.add(s1, f64x2.mul(v128.load(a1 + o), v));
      s2 = f64x2.add(s2, f64x2.mul(v128.load(a2 + o), v));
      s3 = f64x2.add(s3, f64x2.mul(v128.load(a3 + o), v));
    }
    const v = n & 1 ? load<f64>(x + whole) : 0;
    store<f64>(out, across(s0) + (n & 1 ? v * load<f64>(a + whole) : 0));
    store<f64>(out, across(s1) + (n & 1 ? v * load<f64>(a1 + whole) : 0), 8);
    store<f64>(out, across(s2) + (n & 1 ? v * load<f64>(a2 + whole) : 0), 16);
    store<f64>(out, across(s3) + (n & 1 ? v * load<f64>(a3 + whole) : 0), 24);
  }
  for (; r < rows; r++, a += ld, out += 8) store<f64>(out, dot(n, a, x));
}

/** y += sum over r of factor_r row_r, rows of n numbers */
export function addRows(rows: i32, n: i32, a: usize, ld: usize, factors: usize, y: usize): void {
  let r = 0;
  const whole = <usize>(n & ~1) << 3;
  for (; r + 4 <= rows; r += 4, a += 4 * ld, factors += 32) {
    const a1 = a + ld;
    const a2 = a1 + ld;
    const a3 = a2 + ld;
    const f0 = v128.load64_splat(factors);
    const f1 = v128.load64_splat(factors, 8);
    const f2 = v128.load64_splat(factors, 16);
    const f3 = v128.load64_splat(factors, 24);
    for (let o: usize = 0; o < whole; o += 16) {
      const p = f64x2.add(f64x2.mul(v128.load(a + o), f0), f64x2.mul(v128.load(a1 + o), f1));
      const q = f64x2.add(f64x2.mul(v128.load(a2 + o), f2), f64x2.mul(v128.load(a3 + o), f3));
      v128.store(y + o, f64x2.add(v128.load(y + o), f64x2.add(p, q)));
    }
    if (n & 1) {
      const p = load<f64>(a + whole) * load<f64>(factors) + load<f64>(a1 + whole) * load<f64>(factors, 8);
      const q = load<f64>(a2 + whole) * load<f64>(factors, 16) + load<f64>(a3 + whole) * load<f64>(factors, 24);
      store<f64>(y + whole, load<f64>(y + whole) + (p + q));
    }
  }
  for (; r < rows; r++, a += ld, factors += 8) {
    const factor = load<f64>(factors);
    const f = f64x2.splat(factor);
    for (let o: usize = 0; o < whole; o += 16) {
      v128.store(y + o, f64x2.add(v128.load(y + o), f64x2.mul(f, v128.load(a + o))));
    }
    if (n & 1) store<f64>(y + whole, load<f64>(y + whole) + factor * load<f64>(a + whole));
  }
}

/** y = A x, A symmetric with n rows of which the lower triangle is read, each entry once */
export function symmetricTimesVector(n: i32, a: usize, ld: usize, x: usize, y: usize): void {
  let i = 0;
  for (; i + 4 <= n; i += 4) symmetricFourRows(i, a + <usize>i * ld, ld, x, y);
  for (; i < n; i++) {
    const row = a + <usize>i * ld;
    const xi = load<f64>(x + (<usize>i << 3));
    let sum = xi * load<f64>(row + (<usize>i << 3));
    for (let o: usize = 0, end = <usize>i << 3; o < end; o += 8) {
      const entry = load<f64>(row + o);
      sum += entry * load<f64>(x + o);
      store<f64>(y + o, load<f64>(y + o) + entry * xi);
    }
    store<f64>(y + (<usize>i << 3), sum);
  }
}

/** Rows i..i+3 of the product above: their own sums, and their columns' share of y_0..y_(i-1). */
function symmetricFourRows(i: i32, a: usize, ld: usize, x: usize, y: usize): void {
  const end = <usize>i << 3;
  let a1 = a + ld;
  let a2 = a1 + ld;
  let a3 = a2 + ld;
  const x0 = v128.load64_splat(x + end);
  const x1 = v128.load64_splat(x + end, 8);
  const x2 = v128.load64_splat(x + end, 16);
  const x3 = v128.load64_splat(x + end, 24);
  let s0 = f64x2.splat(0);
  let s1 = f64x2.splat(0);
  let s2 = f64x2.splat(0);
  let s3 = f64x2.splat(0);
  for (let o: usize = 0; o < end; o += 16) {
    const v = v128.load(x + o);
    const r0 = v128.load(a + o);
    const r1 = v128.load(a1 + o);
    const r2 = v128.load(a2 + o);
    const r3 = v128.load(a3 + o);
    s0 = f64x2.add(s0, f64x2.mul(r0, v));
    s1 = f64x2.add(s1, f64x2.mul(r1, v));
    s2 = f64x2.add(s2, f64x2.mul(r2, v));
    s3 = f64x2.add(s3, f64x2.mul(r3, v));
    const p = f64x2.add(f64x2.mul(r0, x0), f64x2.mul(r1, x1));
    const q = f64x2.add(f64x2.mul(r2, x2), f64x2.mul(r3, x3));
    v128.store(y + o, f64x2.add(v128.load(y + o), f64x2.add(p, q)));
  }
  a += end;
  a1 += end;
  a2 += end;
  a3 += end;
  x += end;
  y += end;
  const u0 = load<f64>(x);
  const u1 = load<f64>(x, 8);
  const u2 = load<f64>(x, 16);
  const u3 = load<f64>(x, 24);
  const a10 = load<f64>(a1);
  const a20 = load<f64>(a2);
  const a21 = load<f64>(a2, 8);
  const a30 = load<f64>(a3);
  const a31 = load<f64>(a3, 8);
  const a32 = load<f64>(a3, 16);
  store<f64>(y, across(s0) + load<f64>(a) * u0 + a10 * u1 + a20 * u2 + a30 * u3);
  store<f64>(y, across(s1) + a10 * u0 + load<f64>(a1, 8) * u1 + a21 * u2 + a31 * u3, 8);
  store<f64>(y, across(s2) + a20 * u0 + a21 * u1 + load<f64>(a2, 16) * u2 + a32 * u3, 16);
  store<f64>(y, across(s3) + a30 * u0 + a31 * u1 + a32 * u2 + load<f64>(a3, 24) * u3, 24);
}

/** Block sizes of the product below: a packed block of A fills a quarter of a 1 MiB cache. Found by trial; not derived. */
const BLOCK_M: i32 = 128;
const BLOCK_K: i32 = 256;
const BLOCK_N: i32 = 512;

/** Bytes of scratch that `addProduct` needs at `scratch`: packed A, packed B, one tile of C. */
export function productScratch(): i32 {
  return (BLOCK_M * BLOCK_K + BLOCK_K * BLOCK_N + 16) << 3;
}

/**
 * C += factor A B. A is m x k with distances aRow, aColumn (bytes) of two rows and of two columns, B is k x n with bRow,
 * bColumn, so that either may be transposed; C is m x n, row-major, rows cRow bytes apart. Both factors are packed block by
 * block into panels four wide, so that the inner loop runs over contiguous memory (Goto & van de Geijn, ACM Trans. Math. Softw. 34 (2008) 12).
 */
export function addProduct(
  m: i32,
  n: i32,
  k: i32,
  factor: f64,
  a: usize,
  aRow: usize,
  aColumn: usize,
  b: usize,
  bRow: usize,
  bColumn: usize,
  c: usize,
  cRow: usize,
  scratch: usize,
): void {
  const packedB = scratch + (<usize>(BLOCK_M * BLOCK_K) << 3);
  const tile = packedB + (<usize>(BLOCK_K * BLOCK_N) << 3);
  for (let j = 0; j < n; j += BLOCK_N) {
    const width = min(BLOCK_N, n - j);
    for (let l = 0; l < k; l += BLOCK_K) {
      const depth = min(BLOCK_K, k - l);
      packPanels(width, depth, b + <usize>l * bRow + <usize>j * bColumn, bColumn, bRow, packedB);
      for (let i = 0; i < m; i += BLOCK_M) {
        const height = min(BLOCK_M, m - i);
        packPanels(height, depth, a + <usize>i * aRow + <usize>l * aColumn, aRow, aColumn, scratch);
        const corner = c + <usize>i * cRow + (<usize>j << 3);
        multiplyBlock(height, width, depth, factor, scratch, packedB, corner, cRow, tile);
      }
    }
  }
}

/** Copies `count` lines of `depth` numbers into panels of four lines, line index fastest, the last panel filled with zeros. */
function packPanels(count: i32, depth: i32, from: usize, line: usize, step: usize, to: usize): void {
  for (let i = 0; i < count; i += 4, from += 4 * line) {
    if (i + 4 <= count && line === 8) {
      for (let l = 0, p = from; l < depth; l++, p += step, to += 32) {
        v128.store(to, v128.load(p));
        v128.store(to, v128.load(p, 16), 16);
      }
    } else if (i + 4 <= count) {
      const line2 = line + line;
      const line3 = line2 + line;
      for (let l = 0, p = from; l < depth; l++, p += step, to += 32) {
        store<f64>(to, load<f64>(p));
        store<f64>(to, load<f64>(p + line), 8);
        store<f64>(to, load<f64>(p + line2), 16);
        store<f64>(to, load<f64>(p + line3), 24);
      }
    } else {
      for (let l = 0, p = from; l < depth; l++, p += step, to += 32) {
        for (let r = 0; r < 4; r++) {
          store<f64>(to + (<usize>r << 3), i + r < count ? load<f64>(p + <usize>r * line) : 0);
        }
      }
    }
  }
}

/** One packed block of A times one of B; the tile takes the products that would reach beyond C. */
function multiplyBlock(
  height: i32,
  width: i32,
  depth: i32,
  factor: f64,
  packedA: usize,
  packedB: usize,
  c: usize,
  cRow: usize,
  tile: usize,
): void {
  const panel = <usize>depth << 5;
  for (let j = 0, pb = packedB; j < width; j += 4, pb += panel) {
    for (let i = 0, pa = packedA; i < height; i += 4, pa += panel) {
      const corner = c + <usize>i * cRow + (<usize>j << 3);
      if (i + 4 <= height && j + 4 <= width) {
        multiplyTile(depth, factor, pa, pb, corner, cRow);
        continue;
      }
      memory.fill(tile, 0, 128);
      multiplyTile(depth, factor, pa, pb, tile, 32);
      for (let r = 0; r < min(4, height - i); r++) {
        for (let s = 0; s < min(4, width - j); s++) {
          const at = corner + <usize>r * cRow + (<usize>s << 3);
          store<f64>(at, load<f64>(at) + load<f64>(tile + (<usize>(4 * r + s) << 3)));
        }
      }
    }
  }
}

/** Four rows and four columns of C, kept in eight registers over the whole depth. */
function multiplyTile(depth: i32, factor: f64, a: usize, b: usize, c: usize, cRow: usize): void {
  let c00 = f64x2.splat(0);
  let c01 = f64x2.splat(0);
  let c10 = f64x2.splat(0);
  let c11 = f64x2.splat(0);
  let c20 = f64x2.splat(0);
  let c21 = f64x2.splat(0);
  let c30 = f64x2.splat(0);
  let c31 = f64x2.splat(0);
  for (; depth > 0; depth--, a += 32, b += 32) {
    const b0 = v128.load(b);
    const b1 = v128.load(b, 16);
    const a0 = v128.load64_splat(a);
    c00 = f64x2.add(c00, f64x2.mul(a0, b0));
    c01 = f64x2.add(c01, f64x2.mul(a0, b1));
    const a1 = v128.load64_splat(a, 8);
    c10 = f64x2.add(c10, f64x2.mul(a1, b0));
    c11 = f64x2.add(c11, f64x2.mul(a1, b1));
    const a2 = v128.load64_splat(a, 16);
    c20 = f64x2.add(c20, f64x2.mul(a2, b0));
    c21 = f64x2.add(c21, f64x2.mul(a2, b1));
    const a3 = v128.load64_splat(a, 24);
    c30 = f64x2.add(c30, f64x2.mul(a3, b0));
    c31 = f64x2.add(c31, f64x2.mul(a3, b1));
  }
  const f = f64x2.splat(factor);
  addPair(c, f64x2.mul(f, c00), f64x2.mul(f, c01));
  addPair(c + cRow, f64x2.mul(f, c10), f64x2.mul(f, c11));
  addPair(c + 2 * cRow, f64x2.mul(f, c20), f64x2.mul(f, c21));
  addPair(c + 3 * cRow, f64x2.mul(f, c30), f64x2.mul(f, c31));
}

@inline
function addPair(c: usize, left: v128, right: v128): void {
  v128.store(c, f64x2.add(v128.load(c), left));
  v128.store(c, f64x2.add(v128.load(c, 16), right), 16);
}

@inline
function across(v: v128): f64 {
  return f64x2.extract_lane(v, 0) + f64x2.extract_lane(v, 1);
}
