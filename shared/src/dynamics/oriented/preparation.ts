import type { Experiment, Step } from '../../documents/experiment.schema.js';
import { relativePolarisation } from '../../interactions/carriers.js';
import { EngineError } from '../../run/context.js';

/** One pass through a sequence: what happens before the signal, with the phases of this pass. */
export interface Scan {
  readonly steps: readonly Step[];
  /** degrees */
  readonly receiver: number;
}

/** The scans of an experiment, each of weight 1/count. */
export function scansOf({ sequence, observe }: Experiment): Scan[] {
  const pulse = (flip: number, phase: number): Step => ({ pulse: { on: observe, flip, phase } });
  if ('steps' in sequence) {
    const { steps, phaseCycle } = sequence;
    const last = steps[steps.length - 1];
    const before = steps.slice(0, -1);
    if (!phaseCycle) return [{ steps: before, receiver: 'acquire' in last ? last.acquire.phase : 0 }];
    return phaseCycle.map((row) => {
      let next = 0;
      return {
        steps: before.map((step) => ('pulse' in step ? { pulse: { ...step.pulse, phase: row[next++] } } : step)),
        receiver: row[row.length - 1],
      };
    });
  }
  switch (sequence.recipe) {
    case 'pulse-acquire':
      return [{ steps: [pulse(sequence.flip, 0)], receiver: 0 }];
    case 'quadrupole-echo': {
      const delay: Step = { delay: sequence.tau };
      return [{ steps: [pulse(90, 0), delay, pulse(90, 90), delay], receiver: 0 }];
    }
    default:
      throw new EngineError(
        'UNSUPPORTED',
        `'${sequence.recipe}' is not computed for oriented samples`,
        'sequence.recipe',
      );
  }
}

/** What the pulses leave when nothing else happens before the signal. */
export interface PulsedState {
  /** i exp(-i receiver) (x + i y), the transverse magnetisation of every observed spin as the receiver sees it. */
  readonly real: number;
  readonly imag: number;
}

/** The state after a sequence of ideal pulses; null where the sequence holds anything that depends on the Hamiltonian. */
export function pulsedState(experiment: Experiment): PulsedState | null {
  const { sequence, observe } = experiment;
  if ('recipe' in sequence && sequence.recipe === 'cross-polarisation-ideal') {
    return { real: relativePolarisation(sequence.from, observe), imag: 0 };
  }
  const scans = scansOf(experiment);
  const simple = (step: Step) => 'decouple' in step || ('pulse' in step && step.pulse.seconds === undefined);
  if (!scans.every(({ steps }) => steps.every(simple))) return null;
  let [real, imag] = [0, 0];
  for (const { steps, receiver } of scans) {
    const [x, y] = pulsed(steps, observe);
    const [c, s] = [Math.cos(radians(receiver)), Math.sin(radians(receiver))];
    // i exp(-i receiver) (x + i y)
    real += (x * s - y * c) / scans.length;
    imag += (x * c + y * s) / scans.length;
  }
  return { real, imag };
}

/** Isotopes decoupled at each stage of an experiment; the last setting holds during the signal. */
export function decouplingSettings(experiment: Experiment): (readonly string[])[] {
  const { sequence, decouple } = experiment;
  const steps = 'steps' in sequence ? sequence.steps : [];
  return [decouple, ...steps.flatMap((step) => ('decouple' in step ? [step.decouple] : []))];
}

/** Magnetisation of the observed isotope after ideal pulses on it: each turns it about (cos phase, sin phase, 0). */
function pulsed(steps: readonly Step[], observe: string): [x: number, y: number] {
  let [x, y, z] = [0, 0, 1];
  for (const step of steps) {
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
