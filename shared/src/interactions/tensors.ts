import { tensorFromPrincipal, unitVector, type Matrix3 } from '../algebra/rotation.js';
import { REDUCED_PLANCK, VACUUM_PERMEABILITY } from '../constants/constants.js';
import type { Coupling, Nucleus, SpinSystem } from '../documents/system.schema.js';
import { nuclide } from '../nuclides/nuclides.js';
import { signedLarmorHz, type Frame } from './carriers.js';
import { shiftPrincipalAxes } from './shift-notations.js';

/**
 * Second-rank interaction tensors in the molecular frame, 3 x 3 row-major, symmetric and traceless.
 * `Rzz` of the tensor turned into the laboratory is what survives at high field.
 */

/**
 * Anisotropic part of a nucleus's shift tensor (a shift, not a shielding), ppm; null without one.
 * The isotropic part is the nucleus's `shift`.
 */
export function shiftTensorPpm(nucleus: Pick<Nucleus, 'csa'>): Matrix3 | null {
  if (!nucleus.csa) return null;
  const { span, skew, euler } = nucleus.csa;
  return tensorFromPrincipal(shiftPrincipalAxes({ span, skew }), euler);
}

/** `shiftTensorPpm` in Hz with the sense of precession: H = sum over i of T_iz I_i for a field along z. */
export function shiftTensorHz(nucleus: Pick<Nucleus, 'csa' | 'isotope'>, frame: Frame): Matrix3 | null {
  const hzPerPpm = signedLarmorHz(nucleus.isotope, frame) * 1e-6;
  return shiftTensorPpm(nucleus)?.map((value) => value * hzPerPpm) ?? null;
}

/**
 * Quadrupolar tensor Q of a nucleus in Hz, H_Q = I.Q.I; null without a quadrupole.
 * In its own axes Q = CQ/(2I(2I-1)) diag(-(1-eta)/2, -(1+eta)/2, 1) (A. Abragam, Principles of Nuclear Magnetism, 1961, ch. VI).
 */
export function quadrupolarTensorHz(nucleus: Pick<Nucleus, 'quadrupole' | 'isotope'>): Matrix3 | null {
  if (!nucleus.quadrupole) return null;
  const { cq, eta, euler } = nucleus.quadrupole;
  const { spin } = nuclide(nucleus.isotope);
  const scale = cq / (2 * spin * (2 * spin - 1));
  return tensorFromPrincipal([(-(1 - eta) / 2) * scale, (-(1 + eta) / 2) * scale, scale], euler);
}

/** Dipolar constant d = -(mu0/4pi) ga gb hbar/(2 pi r^3) in Hz of two isotopes `distance` angstrom apart. */
export function dipolarConstantHz(isotopeA: string, isotopeB: string, distance: number): number {
  const gammas = nuclide(isotopeA).gamma * nuclide(isotopeB).gamma;
  return (-VACUUM_PERMEABILITY * gammas * REDUCED_PLANCK) / (8 * Math.PI ** 2 * (distance * 1e-10) ** 3);
}

/** Dipolar tensor D = d (3 e e^T - 1) in Hz of constant d along the unit vector e. */
export function axialTensor(constant: number, [x, y, z]: readonly [number, number, number]): Matrix3 {
  const three = 3 * constant;
  // prettier-ignore
  return Float64Array.of(
    three * x * x - constant, three * x * y, three * x * z,
    three * y * x, three * y * y - constant, three * y * z,
    three * z * x, three * z * y, three * z * z - constant,
  );
}

/** One dipolar coupling, H_D = Ia.D.Ib. */
export interface DipolarCoupling {
  /** Rows of `system.nuclei`, a < b. */
  readonly a: number;
  readonly b: number;
  /** Hz */
  readonly tensor: Matrix3;
  readonly like: boolean;
}

/** The dipolar couplings that the system gives, from positions or as constants, whatever is decoupled. */
export function dipolarCouplingsOf(system: SpinSystem): DipolarCoupling[] {
  const row = new Map(system.nuclei.map((nucleus, index) => [nucleus.id, index]));
  return system.couplings.flatMap((coupling) => {
    if (coupling.dipolar === undefined) return [];
    const ends = coupling.between.map((id) => row.get(id)!);
    const [a, b] = [Math.min(...ends), Math.max(...ends)];
    const [first, second] = [system.nuclei[a], system.nuclei[b]];
    return [{ a, b, tensor: dipolarTensorHz(coupling.dipolar, first, second), like: first.isotope === second.isotope }];
  });
}

function dipolarTensorHz(dipolar: NonNullable<Coupling['dipolar']>, a: Nucleus, b: Nucleus): Matrix3 {
  if (dipolar !== 'positions') return axialTensor(dipolar.constant, unitVector(...dipolar.polar));
  const bond = a.position!.map((x, axis) => b.position![axis] - x);
  const distance = Math.hypot(...bond);
  return axialTensor(dipolarConstantHz(a.isotope, b.isotope, distance), [
    bond[0] / distance,
    bond[1] / distance,
    bond[2] / distance,
  ]);
}
