import { eigenSymmetric } from '../../algebra/eigen/symmetric.js';
import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { larmorMHz } from '../../nuclides/nuclides.js';
import { isCommuting, observedClusters } from './oriented-spins.js';
import { decouplingSettings } from './preparation.js';
import { surfacesOf, type Surface } from './surfaces.js';

/** A frequency of an oriented sample worth a mark in its spectrum. */
export interface Landmark {
  readonly ppm: number;
  readonly kind: 'isotropic' | 'edge' | 'sideband';
  readonly nucleus: string;
  /** Order of a sideband; absent otherwise. */
  readonly order?: number;
}

/**
 * Marks of the nuclei without flip-flop partners: isotropic positions (second-order shifts included), the frequencies along the
 * principal axes of static patterns, and sidebands within the window. Transitions below `share` of a nucleus are left out.
 */
export function landmarksOf(system: SpinSystem, experiment: Experiment, share = 0.1): Landmark[] {
  const { sample, acquisition, observe, protonMHz } = experiment;
  if (sample.kind === 'solution') return [];
  const settings = decouplingSettings(experiment);
  const clusters = observedClusters(system, experiment, settings[settings.length - 1]).filter(isCommuting);
  const surfaces = clusters
    .flatMap((cluster) => surfacesOf(cluster, observe))
    .filter(({ intensity }) => intensity >= share);
  const ppm = (hz: number) => acquisition.centre + hz / larmorMHz(observe, protonMHz);
  return surfaces.flatMap((surface): Landmark[] => {
    const nucleus = system.nuclei[surface.row].id;
    const centre = isotropicHz(surface);
    const marks: Landmark[] = [{ ppm: ppm(centre), kind: 'isotropic', nucleus }];
    if (sample.kind === 'powder') {
      for (const hz of principalHz(surface)) marks.push({ ppm: ppm(hz), kind: 'edge', nucleus });
    }
    if (sample.kind === 'spinning') {
      const half = acquisition.width / 2;
      const first = Math.ceil((-half - centre) / sample.rateHz);
      const last = Math.min(Math.floor((half - centre) / sample.rateHz), first + MOST_SIDEBANDS);
      for (let order = first; order <= last; order++) {
        if (order !== 0) marks.push({ ppm: ppm(centre + order * sample.rateHz), kind: 'sideband', nucleus, order });
      }
    }
    return marks;
  });
}

/** More sidebands than this in a window are no help to the eye. */
const MOST_SIDEBANDS = 200;

/** Mean over the sphere: that of (n.Q.n)^2 is 2/15 tr(Q^2) of a traceless Q. */
function isotropicHz({ form, kappa, quadrupole }: Surface): number {
  const square = kappa === 0 ? 0 : quadrupole!.reduce((sum, value) => sum + value * value, 0);
  return (form[0] + form[4] + form[8]) / 3 + (kappa * 2 * square) / 15;
}

/** Frequencies along the principal axes; of the field gradient where second order counts. */
function principalHz({ form, kappa, quadrupole }: Surface): number[] {
  const { vectors } = eigenSymmetric(kappa === 0 ? form : quadrupole!, 3);
  const along = (tensor: Float64Array, v: Float64Array) =>
    tensor.reduce((sum, value, p) => sum + value * v[Math.floor(p / 3)] * v[p % 3], 0);
  return [0, 1, 2].map((axis) => {
    const v = vectors.subarray(3 * axis, 3 * axis + 3);
    const q = kappa === 0 ? 0 : along(quadrupole!, v);
    return along(form, v) + kappa * q * q;
  });
}
