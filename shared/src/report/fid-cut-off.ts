import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { hertz, percent } from './text.js';
import { narrowestNaturalWidth } from './widths.js';

/** The decay of the weighted FID of one line: full widths at half height of its Lorentzian and Gaussian parts, Hz. */
export interface Decay {
  readonly lorentzian: number;
  readonly gaussian: number;
}

/** Relative height at which the FID counts as gone. */
const GONE = 1e-9;
/** Share of the width that a cut-off may add before it warns. */
const TOLERATED = 0.1;

/** What ending the FID after points/width seconds does to the narrowest line. */
export function fidCutOff(system: SpinSystem, experiment: Experiment): Approximation {
  const { acquisition, processing } = experiment;
  const decay = {
    lorentzian: narrowestNaturalWidth(system, experiment) + processing.exponential,
    gaussian: processing.gaussian,
  };
  const duration = acquisition.points / acquisition.width;
  const whole = endless(decay) ? 0 : lineWidth(decay, Infinity);
  const cut = lineWidth(decay, duration);
  const left = envelope(decay, duration);
  return {
    id: 'fid-cut-off',
    title: 'End of the FID',
    made: true,
    hz: Math.max(0, cut - whole),
    computed: 'exact-difference',
    warnAbove: TOLERATED * whole,
    detail: `${percent(left)} of the narrowest line's signal is left after ${+duration.toPrecision(3)} s: it appears ${hertz(cut)} wide, ${hertz(whole)} with an endless FID.`,
  };
}

function envelope({ lorentzian, gaussian }: Decay, t: number): number {
  return Math.exp(-Math.PI * lorentzian * t - (Math.PI * gaussian * t) ** 2 / (4 * Math.LN2));
}

function endless({ lorentzian, gaussian }: Decay): boolean {
  return gaussian === 0 && lorentzian <= 0;
}

/** Time after which the envelope stays below `level`. */
function timeUntil({ lorentzian, gaussian }: Decay, level: number): number {
  const [a, b, c] = [(Math.PI * gaussian) ** 2 / (4 * Math.LN2), Math.PI * lorentzian, Math.log(level)];
  return a === 0 ? -c / b : (-b + Math.sqrt(b * b - 4 * a * c)) / (2 * a);
}

/** Full width at half height of the absorption of a decay that ends after `end` s, by bisection. */
export function lineWidth(decay: Decay, end: number): number {
  const duration = endless(decay) ? end : Math.min(end, timeUntil(decay, GONE));
  const height = absorption(decay, duration, 0);
  // From the resonance outwards in steps of a fraction of the narrowest possible line to the first point below half height.
  const step = 0.1 / duration;
  let outer = step;
  while (absorption(decay, duration, outer) > height / 2) outer += step;
  let inner = outer - step;
  for (let k = 0; k < 50; k++) {
    const middle = (inner + outer) / 2;
    if (absorption(decay, duration, middle) > height / 2) inner = middle;
    else outer = middle;
  }
  return inner + outer;
}

/** Integral over 0..duration of envelope(t) cos(2 pi offset t), s: closed without a Gaussian part, else by Simpson's rule. */
function absorption(decay: Decay, duration: number, offset: number): number {
  const [rate, turn] = [Math.PI * decay.lorentzian, 2 * Math.PI * offset];
  if (decay.gaussian === 0 && (rate !== 0 || turn !== 0)) {
    // Real part of (1 - exp(-(rate + i turn) duration))/(rate + i turn)
    const left = Math.exp(-rate * duration);
    const [re, im] = [1 - left * Math.cos(turn * duration), left * Math.sin(turn * duration)];
    return (re * rate + im * turn) / (rate * rate + turn * turn);
  }
  const steps = 400;
  let sum = 0;
  for (let k = 0; k <= steps; k++) {
    const t = (k * duration) / steps;
    const weight = k === 0 || k === steps ? 1 : k % 2 === 1 ? 4 : 2;
    sum += weight * envelope(decay, t) * Math.cos(turn * t);
  }
  return (sum * duration) / (3 * steps);
}
