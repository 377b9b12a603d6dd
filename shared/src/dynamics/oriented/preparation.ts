import type { Experiment } from '../../documents/experiment.schema.js';
import { relativePolarisation } from '../../interactions/carriers.js';
import { scansOf, type Scan, type ScanStep } from '../../sequence/steps.js';

/** What the pulses leave when nothing else happens before the signal. */
export interface PulsedState {
  /** i exp(-i receiver) (x + i y), the transverse magnetisation of every observed spin as the receiver sees it. */
  readonly real: number;
  readonly imag: number;
}

/** The state after a sequence of ideal pulses; null where the sequence holds anything that depends on the Hamiltonian. */
export function pulsedState(experiment: Experiment): PulsedState | null {
  const scans = scansOf(experiment);
  if (!scans.every(({ steps }) => steps.every(isFree))) return null;
  let [real, imag] = [0, 0];
  for (const scan of scans) {
    const [x, y] = magnetisation(scan, experiment.observe);
    const receiver = radians(receiverPhase(scan));
    const [c, s] = [Math.cos(receiver), Math.sin(receiver)];
    // i exp(-i receiver) (x + i y)
    real += scan.weight * (x * s - y * c);
    imag += scan.weight * (x * c + y * s);
  }
  return { real, imag };
}

/** Whether a step does the same for every orientation and leaves magnetisation only. */
function isFree(step: ScanStep): boolean {
  if ('pulse' in step) return step.pulse.seconds === undefined;
  return 'decouple' in step || 'polarise' in step || 'acquire' in step;
}

/** degrees */
export function receiverPhase({ steps }: Scan): number {
  const last = steps[steps.length - 1];
  return 'acquire' in last ? last.acquire.phase : 0;
}

/** Isotopes decoupled at each stage of an experiment; the last setting holds during the signal. */
export function decouplingSettings(experiment: Experiment): (readonly string[])[] {
  const { sequence, decouple } = experiment;
  const steps = 'steps' in sequence ? sequence.steps : [];
  return [decouple, ...steps.flatMap((step) => ('decouple' in step ? [step.decouple] : []))];
}

/** Magnetisation of the observed isotope after ideal pulses on it: each turns it about (cos phase, sin phase, 0). */
function magnetisation({ steps }: Scan, observe: string): [x: number, y: number] {
  let [x, y, z] = [0, 0, 1];
  for (const step of steps) {
    if ('polarise' in step) [x, y, z] = [0, -relativePolarisation(step.polarise.from, observe), 0];
    if (!('pulse' in step) || step.pulse.on !== observe) continue;
    const [c, s] = [Math.cos(radians(step.pulse.flip)), Math.sin(radians(step.pulse.flip))];
    const [ax, ay] = [Math.cos(radians(step.pulse.phase)), Math.sin(radians(step.pulse.phase))];
    const along = (ax * x + ay * y) * (1 - c);
    [x, y, z] = [c * x + s * ay * z + along * ax, c * y - s * ax * z + along * ay, c * z + s * (ax * y - ay * x)];
  }
  return [x, y];
}

export function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}
