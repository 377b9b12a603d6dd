/**
 * The secular equation of a rank-one update, w(x) = 1/rho + sum_j z_j^2 / (d_j - x) = 0 with rho > 0, d ascending and no z_j = 0:
 * the eigenvalues of diag(d) + rho z z^T, one in each gap and one above the last pole.
 * Roots by rational interpolation between the two nearest poles ("middle way" and "fixed weight" schemes of R.-C. Li,
 * LAPACK Working Note 89 (1994)), kept inside a bracket. Distances from the root to the poles are formed from the nearest pole, hence
 * to high relative accuracy, which the eigenvectors need (Gu & Eisenstat, SIAM J. Matrix Anal. Appl. 16 (1995) 172).
 */
const UNIT_ROUNDOFF = Number.EPSILON / 2;
/** Five to six steps are usual; found by trial on random and clustered poles. */
const MAX_STEPS = 200;
/** From here on steps that do not halve the bracket are replaced by bisection: interpolation can go to and fro for ever. */
const PATIENT_STEPS = 12;

export class SecularEquation {
  private value = 0;
  private psi = 0;
  private psiSlope = 0;
  private phi = 0;
  private phiSlope = 0;

  /** `poles` d and `squares` z_j^2 have at least `count` entries; the squares sum to about 1. */
  constructor(
    private readonly poles: Float64Array,
    private readonly squares: Float64Array,
    private readonly count: number,
    private readonly rho: number,
  ) {}

  /** Root number `index`, ascending. Entry start + j of `distances` becomes d_j - root. Throws a RangeError if it does not converge. */
  root(index: number, distances: Float64Array, start: number): number {
    const { poles, squares, count, rho } = this;
    if (count === 1) {
      distances[start] = -rho * squares[0];
      return poles[0] - distances[start];
    }
    const last = index === count - 1;
    const left = last ? index - 1 : index;
    const gap = poles[left + 1] - poles[left];

    const middle = last ? rho / 2 : gap / 2;
    this.evaluate(last ? index : left, left, middle);
    const nearLeft = !last && this.value >= 0;
    const origin = last ? index : nearLeft ? left : left + 1;
    let low: number;
    let high: number;
    if (last) [low, high] = this.value <= 0 ? [middle, 2 * rho] : [0, middle];
    else [low, high] = nearLeft ? [0, middle] : [-middle, 0];
    let shift = last ? this.guessLast(left, gap, middle) : this.guessInner(left, gap, nearLeft);
    if (!(shift > low && shift < high)) shift = (low + high) / 2;
    let fixedWeight = false;
    let width = high - low;

    for (let steps = 0; ; steps++) {
      if (steps === MAX_STEPS) throw new RangeError('The secular equation did not converge');
      const before = Math.abs(this.value);
      this.evaluate(origin, left, shift);
      if (Math.abs(this.value) <= this.roundingError(shift)) break;
      if (this.value <= 0) low = shift;
      else high = shift;
      if (steps > 0 && Math.abs(this.value) > before / 10) fixedWeight = !fixedWeight;
      let next = shift + this.step(origin, left, shift, fixedWeight, last);
      const slow = steps >= PATIENT_STEPS && high - low > width / 2;
      width = high - low;
      if (slow || !(next > low && next < high)) next = (low + high) / 2;
      if (next === shift || next === low || next === high) break;
      shift = next;
    }
    for (let j = 0; j < count; j++) distances[start + j] = poles[j] - poles[origin] - shift;
    return poles[origin] + shift;
  }

  /** w at d_origin + shift, its parts from the poles up to `left` (psi) and beyond (phi), and their slopes. */
  private evaluate(origin: number, left: number, shift: number): void {
    const { poles, squares } = this;
    const from = poles[origin];
    let psi = 0;
    let psiSlope = 0;
    for (let j = 0; j <= left; j++) {
      const inverse = 1 / (poles[j] - from - shift);
      const term = squares[j] * inverse;
      psi += term;
      psiSlope += term * inverse;
    }
    let phi = 0;
    let phiSlope = 0;
    for (let j = this.count - 1; j > left; j--) {
      const inverse = 1 / (poles[j] - from - shift);
      const term = squares[j] * inverse;
      phi += term;
      phiSlope += term * inverse;
    }
    this.psi = psi;
    this.psiSlope = psiSlope;
    this.phi = phi;
    this.phiSlope = phiSlope;
    this.value = 1 / this.rho + psi + phi;
  }

  /** Bound of the rounding error of w, as in the working note. */
  private roundingError(shift: number): number {
    const sums = 8 * (Math.abs(this.psi) + Math.abs(this.phi)) + 1 / this.rho;
    return UNIT_ROUNDOFF * (sums + Math.abs(shift) * (this.psiSlope + this.phiSlope));
  }

  /** Root of the two nearest poles' terms plus the rest as it is in the middle of the gap; counted from the nearer pole. */
  private guessInner(left: number, gap: number, nearLeft: boolean): number {
    const zl = this.squares[left];
    const zr = this.squares[left + 1];
    const rest = this.value + (2 * zl) / gap - (2 * zr) / gap;
    const c = nearLeft ? rest : -rest;
    const shift = smallerRoot(c, c * gap + zl + zr, (nearLeft ? zl : zr) * gap);
    return nearLeft ? shift : -shift;
  }

  /** The same above the last pole, where the rest is taken half way to the upper bound d + rho. */
  private guessLast(left: number, gap: number, middle: number): number {
    const zl = this.squares[left];
    const zr = this.squares[left + 1];
    const c = this.value + zl / (gap + middle) + zr / middle;
    const a = zl + zr - c * gap;
    const b = zr * gap;
    const root = Math.sqrt(a * a + 4 * b * c);
    return a < 0 ? (2 * b) / (root - a) : (a + root) / (2 * c);
  }

  /** Correction of the shift by the rational interpolant c + s/(dl - x) + t/(dr - x). */
  private step(origin: number, left: number, shift: number, fixedWeight: boolean, last: boolean): number {
    const { poles, squares, value } = this;
    const dl = poles[left] - poles[origin] - shift;
    const dr = poles[left + 1] - poles[origin] - shift;
    const slope = this.psiSlope + this.phiSlope;
    let c = value - dl * this.psiSlope - dr * this.phiSlope;
    if (fixedWeight) {
      const gap = poles[left + 1] - poles[left];
      c =
        origin === left
          ? value - dr * slope + gap * (squares[left] / (dl * dl))
          : value - dl * slope - gap * (squares[left + 1] / (dr * dr));
    }
    const a = (dl + dr) * value - dl * dr * slope;
    const b = dl * dr * value;
    const correction = last ? largerRoot(Math.abs(c), a, b) : smallerRoot(c, a, b);
    return value * correction < 0 ? correction : -value / slope;
  }
}

/** (a - sqrt(a^2 - 4bc)) / 2c without cancellation. */
function smallerRoot(c: number, a: number, b: number): number {
  const root = Math.sqrt(Math.abs(a * a - 4 * b * c));
  return a <= 0 ? (a - root) / (2 * c) : (2 * b) / (a + root);
}

/** (a + sqrt(a^2 - 4bc)) / 2c without cancellation. */
function largerRoot(c: number, a: number, b: number): number {
  const root = Math.sqrt(Math.abs(a * a - 4 * b * c));
  return a >= 0 ? (a + root) / (2 * c) : (2 * b) / (a - root);
}
