import { larmorMHz, nuclide, type SpinSystem } from '@heddle/shared';

export interface Window {
  /** ppm */
  readonly centre: number;
  /** Hz */
  readonly width: number;
  readonly points: number;
}

/** Narrowest window offered, Hz. Common practice for a single line; not derived. */
const NARROWEST = 100;
/** Acquisition time in units of 1/line width: the FID then ends at exp(-3 pi), 1e-4 of its start. */
const DECAYS = 3;
const POINTS = { least: 2048, most: 131072 } as const;

/**
 * A window that holds everything the observed nuclei show: their shifts in every state, the outermost lines of their
 * multiplets, and outside solutions the breadth of their tensors, with a tenth to spare on each side.
 */
export function autoWindow(
  system: SpinSystem,
  settings: { observe: string; protonMHz: number; lineWidth: number; solid: boolean },
): Window | null {
  const observed = system.nuclei.filter((nucleus) => nucleus.isotope === settings.observe);
  if (observed.length === 0) return null;
  const mhz = larmorMHz(settings.observe, settings.protonMHz);
  let [low, high, narrowest] = [Infinity, -Infinity, Infinity];
  for (const nucleus of observed) {
    const reach = (multipletReach(system, nucleus.id) + (settings.solid ? tensorReach(nucleus, mhz) : 0)) / mhz;
    for (const shift of [
      nucleus.shift,
      ...(system.states ?? []).map((state) => state.shifts[nucleus.id] ?? nucleus.shift),
    ]) {
      low = Math.min(low, shift - reach);
      high = Math.max(high, shift + reach);
    }
    narrowest = Math.min(narrowest, nucleus.lineWidth ?? settings.lineWidth);
  }
  const lineWidth = narrowest > 0 ? narrowest : 1;
  const span = (high - low) * mhz;
  const width = Math.ceil(Math.max(span * 1.2, span + 40 * lineWidth, NARROWEST) / 10) * 10;
  const centre = +((low + high) / 2).toFixed(3);
  const points = 2 ** Math.ceil(Math.log2((DECAYS * width) / lineWidth));
  return { centre, width, points: Math.min(Math.max(points, POINTS.least), POINTS.most) };
}

/** Half the breadth of a nucleus's multiplet in Hz: its couplings times the largest |m| of what they lead to. */
function multipletReach(system: SpinSystem, id: string): number {
  const spins = new Map(system.nuclei.map((nucleus) => [nucleus.id, nucleus.count * nuclide(nucleus.isotope).spin]));
  let reach = 0;
  for (const { between, j } of system.couplings) {
    const partner = between[0] === id ? between[1] : between[1] === id ? between[0] : null;
    if (partner !== null) reach += Math.abs(j) * (spins.get(partner) ?? 0);
  }
  return reach;
}

/**
 * How far an oriented nucleus's lines lie from its isotropic shift, Hz: the span of its shift tensor; for a whole spin the
 * outermost first-order satellites, 3 CQ/(4I); for a half-integer one the second-order breadth of the central transition,
 * of the order (3 CQ/(2I(2I-1)))^2 (I(I+1) - 3/4)/nu0 (textbook first- and second-order formulas, from memory).
 */
function tensorReach(nucleus: SpinSystem['nuclei'][number], mhz: number): number {
  const spin = nuclide(nucleus.isotope).spin;
  const shift = (nucleus.csa?.span ?? 0) * mhz;
  const cq = Math.abs(nucleus.quadrupole?.cq ?? 0);
  if (cq === 0) return shift;
  if (Number.isInteger(spin)) return shift + (3 * cq) / (4 * spin);
  const first = (3 * cq) / (2 * spin * (2 * spin - 1));
  return shift + (first ** 2 * (spin * (spin + 1) - 0.75)) / (mhz * 1e6) / 2;
}
