import { rotationMatrix, type Matrix3 } from '../../algebra/rotation.js';
import type { Experiment } from '../../documents/experiment.schema.js';
import type { ExchangeState, SpinSystem } from '../../documents/system.schema.js';
import { inFrame, symmetryOf, type Symmetry } from '../../orientations/symmetry.js';
import { EngineError } from '../../run/context.js';
import { CoupledSpins } from './coupled-spins.js';
import { preparedSpectrum, pulsedSpectrum } from './coupled-spectrum.js';
import { crystalJob } from './crystal.js';
import { decayClasses, type DecayClasses } from './decay-classes.js';
import { DensityPreparation } from './density-preparation.js';
import type { Job } from './job.js';
import {
  decoupledCluster,
  isCommuting,
  observedClusters,
  tensorsOf,
  turnCluster,
  type SpinCluster,
} from './oriented-spins.js';
import { weighted, type DirectionalSpectrum } from './directional-spectrum.js';
import { patchJob } from './powder.js';
import { decouplingSettings, pulsedState, type PulsedState } from './preparation.js';
import { coupledSpinningJob } from './spinning-coupled.js';
import { surfaceSpinningJob } from './spinning-surfaces.js';
import { surfaceSpectrum } from './surface-spectrum.js';
import { formsOf, surfacesOf, turnSurface, type Surface } from './surfaces.js';

/** The work of a run. */
export interface Plan {
  readonly jobs: readonly Job[];
  readonly classes: DecayClasses;
  /** Null where the state before the signal depends on the orientation. */
  readonly pulsed: PulsedState | null;
  /** Whether any of the clusters needs the product basis. */
  readonly coupled: boolean;
}

/** What every job of a run is made of. */
interface Setting {
  readonly experiment: Experiment;
  readonly classes: DecayClasses;
  readonly pulsed: PulsedState | null;
  /** Isotopes decoupled during the signal. */
  readonly decoupled: readonly string[];
  /** Frequencies that are interpolated may be wrong by this much, Hz. */
  readonly toleranceHz: number;
}

export function planOf(system: SpinSystem, experiment: Experiment): Plan {
  refuseUnsupported(system, experiment);
  const classes = decayClasses(system, experiment);
  const pulsed = pulsedState(experiment);
  const settings = decouplingSettings(experiment);
  const decoupled = settings[settings.length - 1];
  const setting: Setting = { experiment, classes, pulsed, decoupled, toleranceHz: toleranceOf(experiment, classes) };
  // Before a prepared signal couplings act that are decoupled later: a cluster is what is ever coupled.
  const always = pulsed ? decoupled : decoupled.filter((isotope) => settings.every((list) => list.includes(isotope)));
  const states: (ExchangeState | undefined)[] = system.states ?? [undefined];
  const clusters = states.flatMap((state) =>
    observedClusters(system, experiment, always, state).map((cluster) => ({ cluster, weight: state?.population ?? 1 })),
  );
  const jobs = clusters.flatMap(({ cluster, weight }) => jobsOf(cluster, weight, setting));
  const coupled = clusters.some(({ cluster }) => !pulsed || !isCommuting(cluster));
  return { jobs, classes, pulsed, coupled };
}

/** Phase, in radians, that interpolation may add by the time the signal has decayed. */
const TOLERATED_PHASE = 0.1;

function toleranceOf({ acquisition }: Experiment, { lineWidths }: DecayClasses): number {
  const decayed = 2 / (Math.PI * Math.min(...lineWidths));
  const seconds = Math.min(acquisition.points / acquisition.width, decayed);
  return TOLERATED_PHASE / (2 * Math.PI * seconds);
}

function jobsOf(cluster: SpinCluster, weight: number, setting: Setting): Job[] {
  if (setting.pulsed === null || !isCommuting(cluster)) return [coupledJob(cluster, weight, setting)];
  return surfaceGroups(surfacesOf(cluster, setting.experiment.observe)).map((group) =>
    surfaceJob(group, weight, setting),
  );
}

/** All surfaces together where they share their axes; else each by itself, since one alone mostly has the symmetry of its own. */
function surfaceGroups(surfaces: readonly Surface[]): Surface[][] {
  const together = symmetryOf(surfaces.flatMap(formsOf)).domain === 'octant';
  return together ? [[...surfaces]] : surfaces.map((surface) => [surface]);
}

function surfaceJob(surfaces: readonly Surface[], weight: number, setting: Setting): Job {
  const { classes, experiment } = setting;
  const symmetry = symmetryOf(surfaces.flatMap(formsOf));
  const turned = surfaces.map((surface) => ({
    ...turnSurface(surface, (tensor) => inFrame(symmetry.frame, tensor)),
    intensity: weight * surface.intensity,
  }));
  if (experiment.sample.kind === 'spinning')
    return surfaceSpinningJob(turned, symmetry.domain, experiment.sample, classes, setting.toleranceHz);
  return staticJob(surfaceSpectrum(turned, classes), symmetry, setting);
}

function coupledJob(cluster: SpinCluster, weight: number, setting: Setting): Job {
  const { experiment, classes, decoupled } = setting;
  const symmetry = symmetryOf(tensorsOf(cluster));
  const turned = turnCluster(cluster, (tensor) => inFrame(symmetry.frame, tensor));
  const coupled = new CoupledSpins(decoupledCluster(turned, decoupled));
  if (experiment.sample.kind === 'spinning') {
    return coupledSpinningJob(coupled, symmetry.domain, experiment.observe, experiment.sample, classes, weight);
  }
  if (setting.pulsed)
    return staticJob(weighted(pulsedSpectrum(coupled, experiment.observe, classes), weight), symmetry, setting);
  const preparation = new DensityPreparation(experiment, (list) => new CoupledSpins(decoupledCluster(turned, list)));
  return staticJob(
    weighted(preparedSpectrum(coupled, preparation, experiment.observe, classes), weight),
    symmetry,
    setting,
  );
}

function staticJob(
  spectrum: DirectionalSpectrum,
  { frame, domain }: Symmetry,
  { experiment, toleranceHz }: Setting,
): Job {
  const { sample } = experiment;
  if (sample.kind === 'powder') return patchJob(spectrum, domain, sample.orientations, toleranceHz);
  if (sample.kind === 'crystal') return crystalJob(spectrum, along(frame, rotationMatrix(sample.euler)));
  throw new EngineError('UNSUPPORTED', 'a solution has no orientation', 'sample.kind');
}

/** The field, along the third row of the rotation of the molecule, seen in `frame`. */
function along(frame: Matrix3, rotation: Matrix3): Float64Array {
  return Float64Array.from({ length: 3 }, (_, i) => {
    let sum = 0;
    for (let k = 0; k < 3; k++) sum += frame[3 * i + k] * rotation[6 + k];
    return sum;
  });
}

function refuseUnsupported(system: SpinSystem, { relaxation }: Experiment): void {
  if (relaxation === 't1-t2') {
    throw new EngineError('UNSUPPORTED', 'oriented samples decay by line widths only', 'relaxation');
  }
  const exchanging = (system.exchange ?? []).some(({ rate }) => rate !== 0);
  if (exchanging) throw new EngineError('UNSUPPORTED', 'exchange is not computed for oriented samples', 'sample.kind');
}
