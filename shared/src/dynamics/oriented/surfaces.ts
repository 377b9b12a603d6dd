import { innerProduct3, multiply3, type Matrix3 } from '../../algebra/rotation.js';
import type { OrientedSpin, SpinCluster } from './oriented-spins.js';

/**
 * A transition between two product states of a cluster whose terms commute. Along the unit vector n its frequency is
 *   n.A.n + kappa (n.Q.n)^2  Hz
 * exactly: every first-order term is a quadratic form of n, and the second-order quadrupolar terms add the quartic part.
 */
export interface Surface {
  /** Row of the observed nucleus in `system.nuclei`. */
  readonly row: number;
  /** A in Hz, symmetric; a third of its trace is the isotropic frequency. */
  readonly form: Matrix3;
  readonly kappa: number;
  readonly quadrupole: Matrix3 | null;
  /** Share of the nucleus's signal after a perfect pulse; the shares of one nucleus sum to 1. */
  readonly intensity: number;
}

/** The transitions of the observed spins; those that coincide for every direction are one. */
export function surfacesOf({ spins, pairs }: SpinCluster, observe: string): Surface[] {
  const surfaces = spins.flatMap((spin, k) => {
    if (spin.isotope !== observe) return [];
    let own = ownTransitions(spin);
    for (const { a, b, j, dipolar } of pairs) {
      if (a !== k && b !== k) continue;
      const partner = spins[a === k ? b : a];
      own = merge(own.flatMap((surface) => splitBy(surface, partner.spin, j, dipolar)));
    }
    return own;
  });
  return merge(surfaces);
}

/** The 2I transitions of a spin by itself. */
function ownTransitions(spin: OrientedSpin): Surface[] {
  const { spin: I, offset, shift, quadrupole } = spin;
  const total = (2 * I * (I + 1) * (2 * I + 1)) / 3;
  const zeeman = plus(scalar(offset), shift, 1);
  return Array.from({ length: 2 * I }, (_, i) => {
    const m = I - i;
    const intensity = ladder(I, m) / total;
    if (!quadrupole) return { row: spin.row, form: zeeman, kappa: 0, quadrupole, intensity };
    const first = plus(zeeman, quadrupole, 1.5 * (2 * m - 1));
    return { row: spin.row, intensity, quadrupole, ...secondOrder(first, spin, m) };
  });
}

/**
 * Adds the second-order terms of the transition m <-> m - 1. A level gains sum over n of |V_mn|^2/(nu0 (m - n)), and with
 * q = n.Q.n, |V_m,m-1|^2 has the factor (n.Q^2.n - q^2)/4 and |V_m,m-2|^2 the factor (q^2 - 4 n.adj(Q).n)/16
 * (A. Abragam, Principles of Nuclear Magnetism, 1961, ch. VII).
 */
function secondOrder(form: Matrix3, spin: OrientedSpin, m: number): { form: Matrix3; kappa: number } {
  const Q = spin.quadrupole!;
  const { single, double } = quadrupolarShift(spin, m);
  const { single: singleBelow, double: doubleBelow } = quadrupolarShift(spin, m - 1);
  const alpha = single - singleBelow;
  const beta = double - doubleBelow;
  return { form: plus(plus(form, multiply3(Q, Q), alpha), adjugate(Q), -4 * beta), kappa: beta - alpha };
}

/** Second-order shift of the level m: Hz for each unit of n.Q^2.n - q^2 and of q^2 - 4 n.adj(Q).n. */
export function quadrupolarShift({ spin: I, larmor }: OrientedSpin, m: number): { single: number; double: number } {
  const one = (upper: number) => (2 * upper - 1) ** 2 * ladder(I, upper);
  const two = (upper: number) => ladder(I, upper) * ladder(I, upper - 1);
  return { single: (one(m) - one(m + 1)) / (4 * larmor), double: (two(m) - two(m + 2)) / (32 * larmor) };
}

/** <m|I+|m-1>^2 = I(I+1) - m(m-1) */
function ladder(I: number, m: number): number {
  return I * (I + 1) - m * (m - 1);
}

/** The surface once for each projection of a coupled spin. */
function splitBy(surface: Surface, spin: number, j: number, dipolar: Matrix3 | null): Surface[] {
  const levels = 2 * spin + 1;
  return Array.from({ length: levels }, (_, i) => {
    const m = spin - i;
    const form = plus(plus(surface.form, scalar(j), m), dipolar, m);
    return { ...surface, form, intensity: surface.intensity / levels };
  });
}

function merge(surfaces: readonly Surface[]): Surface[] {
  const merged = new Map<string, Surface>();
  for (const surface of surfaces) {
    const { row, form, kappa, quadrupole, intensity } = surface;
    const numbers = [...form, kappa, ...(kappa === 0 ? [] : quadrupole!)];
    const key = [row, ...numbers.map((value) => value.toPrecision(12))].join();
    merged.set(key, { ...surface, intensity: intensity + (merged.get(key)?.intensity ?? 0) });
  }
  return [...merged.values()];
}

/** Frequency of a surface along the unit vector (x, y, z), Hz. */
export function surfaceFrequency({ form, kappa, quadrupole }: Surface, x: number, y: number, z: number): number {
  const frequency = quadratic(form, x, y, z);
  if (kappa === 0) return frequency;
  const q = quadratic(quadrupole!, x, y, z);
  return frequency + kappa * q * q;
}

/** n.A.n */
export function quadratic(a: Matrix3, x: number, y: number, z: number): number {
  return a[0] * x * x + a[4] * y * y + a[8] * z * z + 2 * (a[1] * x * y + a[2] * x * z + a[5] * y * z);
}

/** Tensors whose common axes are those of the surface's symmetry. */
export function formsOf({ form, kappa, quadrupole }: Surface): Matrix3[] {
  return kappa === 0 ? [form] : [form, quadrupole!];
}

/** The surface with its tensors turned by `turn`. */
export function turnSurface(surface: Surface, turn: (tensor: Matrix3) => Matrix3): Surface {
  return { ...surface, form: turn(surface.form), quadrupole: surface.quadrupole && turn(surface.quadrupole) };
}

function scalar(value: number): Matrix3 {
  return Float64Array.of(value, 0, 0, 0, value, 0, 0, 0, value);
}

/** a + factor b */
function plus(a: Matrix3, b: Matrix3 | null, factor: number): Matrix3 {
  return b ? a.map((value, p) => value + factor * b[p]) : a;
}

/** adj(A) = A^2 - tr(A) A + (tr(A)^2 - tr(A^2))/2, of a traceless symmetric A (Cayley & Hamilton). */
function adjugate(a: Matrix3): Matrix3 {
  return plus(multiply3(a, a), scalar(innerProduct3(a, a)), -0.5);
}
