import { addScaledInto, complexIdentity, complexMatrix, multiplyComplex, type ComplexMatrix } from './dense.js';
import { solveComplexInPlace } from './dense-solve.js';

/**
 * Matrix exponential by scaling and squaring with diagonal Padé approximants
 * (N. J. Higham, SIAM J. Matrix Anal. Appl. 26 (2005) 1179): the approximant of degree m is accurate to the unit
 * roundoff for 1-norms up to theta_m (table 2.3 there); beyond the last, A is halved s times and the result squared s times.
 */
const THETA: readonly (readonly [degree: number, norm: number])[] = [
  [3, 1.495585217958292e-2],
  [5, 2.53939833006323e-1],
  [7, 9.504178996162932e-1],
  [9, 2.097847961257068],
];
const THETA_13 = 5.371920351148152;

/** exp(A) of a square complex matrix. Throws a RangeError if an entry is not finite. */
export function expmDense(a: ComplexMatrix): ComplexMatrix {
  if (a.rows !== a.columns) throw new RangeError(`Shapes do not fit: exponential of a ${a.rows} x ${a.columns} matrix`);
  const norm = oneNorm(a);
  if (!Number.isFinite(norm)) throw new RangeError('The matrix to be exponentiated has entries that are not finite');
  const small = THETA.find(([, limit]) => norm <= limit);
  if (small) return pade(a, small[0]);
  const squarings = Math.max(0, Math.ceil(Math.log2(norm / THETA_13)));
  const scaled = addScaledInto(complexMatrix(a.rows, a.rows), a, 2 ** -squarings);
  let result = pade(scaled, 13);
  for (let k = 0; k < squarings; k++) result = multiplyComplex(result, result);
  return result;
}

/** Largest column sum of absolute values. */
export function oneNorm(a: ComplexMatrix): number {
  const sums = new Float64Array(a.columns);
  for (let i = 0, p = 0; i < a.rows; i++) {
    for (let j = 0; j < a.columns; j++, p++) sums[j] += Math.hypot(a.real[p], a.imag[p]);
  }
  return sums.reduce((most, sum) => (sum > most || Number.isNaN(sum) ? sum : most), 0);
}

/** (V - U)^-1 (V + U): U holds the odd and V the even powers of the degree-m approximant's numerator. */
function pade(a: ComplexMatrix, degree: number): ComplexMatrix {
  const n = a.rows;
  const b = padeCoefficients(degree);
  const powers = [complexIdentity(n)];
  const top = degree === 13 ? 3 : (degree - 1) / 2;
  if (top > 0) powers.push(multiplyComplex(a, a));
  while (powers.length <= top) powers.push(multiplyComplex(powers[powers.length - 1], powers[1]));
  const sum = (offset: number, first: number) => {
    const out = complexMatrix(n, n);
    for (let k = first; k <= top; k++) addScaledInto(out, powers[k], b[2 * k + offset]);
    return out;
  };
  let odd = sum(1, 0);
  let even = sum(0, 0);
  if (degree === 13) {
    odd = addScaledInto(multiplyComplex(powers[3], sum(7, 1)), odd, 1);
    even = addScaledInto(multiplyComplex(powers[3], sum(6, 1)), even, 1);
  }
  const u = multiplyComplex(a, odd);
  const denominator = addScaledInto(addScaledInto(complexMatrix(n, n), even, 1), u, -1);
  return solveComplexInPlace(denominator, addScaledInto(even, u, 1));
}

/** Coefficient of x^k in the numerator, (2m - k)! m! / ((2m)! (m - k)! k!), scaled so that the highest is 1. */
function padeCoefficients(degree: number): number[] {
  const b = new Array<number>(degree + 1);
  b[degree] = 1;
  for (let k = degree - 1; k >= 0; k--) b[k] = (b[k + 1] * (2 * degree - k) * (k + 1)) / (degree - k);
  return b;
}
