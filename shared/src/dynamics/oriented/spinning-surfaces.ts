import type { Sample } from '../../documents/experiment.schema.js';
import { innerProduct3 } from '../../algebra/rotation.js';
import { gaussProduct, type OrientationSet } from '../../orientations/gauss-product.js';
import type { Domain } from '../../orientations/symmetry.js';
import type { DecayClasses } from './decay-classes.js';
import type { DirectionalSpectrum } from './directional-spectrum.js';
import type { Job } from './job.js';
import { patchJob } from './powder.js';
import { rotorCone } from './rotor.js';
import { highestOrder, SidebandSeries } from './sidebands.js';
import type { SignalSum } from './signal-sum.js';
import type { Surface } from './surfaces.js';
import type { TrianglePattern } from './triangle-pattern.js';

export type Spinning = Extract<Sample, { kind: 'spinning' }>;

/** A family of sidebands for each surface, as a spectrum whose directions are those of the rotor axis in the molecule. */
function sidebandSpectrum(surfaces: readonly Surface[], sample: Spinning, classes: DecayClasses): DirectionalSpectrum {
  const cone = rotorCone(sample.angle);
  const families = surfaces.map((surface) => {
    const orders = highestOrder(spreadOf(surface), sample.rateHz);
    return { surface, orders, series: new SidebandSeries(sample.rateHz, orders) };
  });
  const transitions = families.reduce((sum, { orders }) => sum + 2 * orders + 1, 0);
  return {
    transitions,
    channels: classes.lineWidths.length,
    evaluate(direction, frequency, amplitude) {
      cone.setAxis(direction);
      let t = 0;
      for (const { surface, orders, series } of families) {
        series.evaluate(surface, cone);
        const channel = classes.classOf(surface.row) * transitions;
        for (let order = -orders; order <= orders; order++, t++) {
          frequency[t] = series.mean + order * sample.rateHz;
          amplitude[channel + t] = surface.intensity * series.intensity[order < 0 ? series.size + order : order];
        }
      }
    },
  };
}

/**
 * A spinning powder of a cluster whose terms commute. Where the centres of the sideband families stay put the mean over the
 * sphere is that of a smooth function, and a quadrature does; where they move, frequencies are interpolated.
 */
export function surfaceSpinningJob(
  surfaces: readonly Surface[],
  domain: Domain,
  sample: Spinning,
  classes: DecayClasses,
  toleranceHz: number,
): Job {
  const spectrum = sidebandSpectrum(surfaces, sample, classes);
  const moves = Math.max(...surfaces.map((surface) => movementOf(surface, sample.angle)));
  if (moves > STILL * toleranceHz) return patchJob(spectrum, domain, sample.orientations, toleranceHz);
  const frequency = new Float64Array(spectrum.transitions);
  const amplitude = new Float64Array(spectrum.channels * spectrum.transitions);
  return quadratureJob(sample.orientations, domain, spectrum.transitions, (direction, weight, patterns) => {
    spectrum.evaluate(direction, frequency, amplitude);
    patterns.forEach((pattern, c) => {
      for (let t = 0; t < spectrum.transitions; t++) {
        const value = weight * amplitude[c * spectrum.transitions + t];
        if (Math.abs(value) > NEGLIGIBLE) pattern.addStick(frequency[t], value);
      }
    });
  });
}

/** Centres that move by less than this many tolerances turn the signal by a radian at most: it stays smooth. */
const STILL = 10;
/** Sticks below this many nuclei are left out. */
const NEGLIGIBLE = 1e-14;
/** Directions in one unit of work. */
const UNIT = 16;

/** The mean of whatever `visit` adds along a direction, over a product rule and over one of a quarter of its size. */
export function quadratureJob(
  orientations: number,
  domain: Domain,
  transitions: number,
  visit: (direction: Float64Array, weight: number, patterns: readonly TrianglePattern[]) => void,
): Job {
  const sets: OrientationSet[] = [gaussProduct(orientations, domain), gaussProduct(orientations / 4, domain)];
  const units = sets.map(({ count }) => Math.ceil(count / UNIT));
  return {
    orientations: sets[0].orientations,
    transitions,
    units: units[0] + units[1],
    costOf: () => UNIT,
    run(unit, sum: SignalSum) {
      const isFine = unit < units[0];
      const { directions, weights, count } = sets[isFine ? 0 : 1];
      const first = UNIT * (isFine ? unit : unit - units[0]);
      for (let k = first; k < Math.min(count, first + UNIT); k++) {
        visit(directions.subarray(3 * k, 3 * k + 3), weights[k], isFine ? sum.fine : sum.coarse);
      }
    },
  };
}

/** A bound of how far the frequency strays from its mean: a traceless tensor's eigenvalues span at most sqrt(2) |A|. */
function spreadOf({ form, kappa, quadrupole }: Surface): number {
  const quartic = kappa === 0 ? 0 : Math.abs(kappa) * innerProduct3(quadrupole!, quadrupole!);
  return Math.SQRT2 * anisotropyOf(form) + quartic;
}

/** A bound of how far the centre of a sideband family moves with orientation: rank 2 scales by P2, rank 4 stays. */
function movementOf({ form, kappa, quadrupole }: Surface, angle: number): number {
  const cosine = Math.cos((angle * Math.PI) / 180);
  const quartic = kappa === 0 ? 0 : Math.abs(kappa) * innerProduct3(quadrupole!, quadrupole!);
  return Math.abs(1.5 * cosine * cosine - 0.5) * Math.SQRT2 * anisotropyOf(form) + quartic;
}

/** Frobenius norm of the traceless part. */
function anisotropyOf(form: Float64Array): number {
  const mean = (form[0] + form[4] + form[8]) / 3;
  return Math.sqrt(Math.max(0, innerProduct3(form, form) - 3 * mean * mean));
}
