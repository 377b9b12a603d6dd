import type { Experiment, FreeSequence, Recipe, Step } from '../documents/experiment.schema.js';

/** A step of a scan: one of the document's, or the state that ideal cross-polarisation leaves. */
export type ScanStep = Step | { polarise: { from: string } };

/** One way through a sequence; the signal is the sum of all scans times their weights. */
export interface Scan {
  readonly steps: readonly ScanStep[];
  readonly weight: number;
}

/** The scans of an experiment: its recipe written as steps, or its steps once for each row of the phase cycle. */
export function scansOf({ sequence, observe }: Pick<Experiment, 'sequence' | 'observe'>): Scan[] {
  return 'recipe' in sequence ? recipeScans(sequence, observe) : freeScans(sequence);
}

/** Strength of the field that saturates in an NOE difference, Hz. */
const NOE_NUTATION = 50;

const pulse = (on: string, flip: number, phase = 0): Step => ({ pulse: { on, flip, phase } });
const delay = (seconds: number): Step => ({ delay: seconds });
const acquire = (phase = 0): Step => ({ acquire: { phase } });

/** Recipes as the document defines them: o observed, f the nucleus that polarisation comes from. */
export function recipeScans(recipe: Recipe, o: string): Scan[] {
  const one = (...steps: ScanStep[]): Scan[] => [{ steps: [...steps, acquire()], weight: 1 }];
  switch (recipe.recipe) {
    case 'pulse-acquire':
      return one(pulse(o, recipe.flip));
    case 'spin-echo':
      return one(pulse(o, 90), ...echo(o, recipe.tau));
    case 'cpmg':
      return one(pulse(o, 90), ...Array.from({ length: recipe.loops }, () => echo(o, recipe.tau)).flat());
    case 'inversion-recovery':
      return one(pulse(o, 180), delay(recipe.delay), pulse(o, 90));
    case 'saturation-recovery':
      return one(pulse(o, 90), { spoil: true }, delay(recipe.delay), pulse(o, 90));
    case 'quadrupole-echo':
      return one(pulse(o, 90), delay(recipe.tau), pulse(o, 90, 90), delay(recipe.tau));
    case 'inept':
      return twoScans((phase) => ineptSteps(recipe, o, phase));
    case 'dept':
      return twoScans((phase) => deptSteps(recipe, o, phase));
    case 'noe-difference':
      return [
        { steps: [saturate(recipe.saturate, recipe.time), pulse(o, 90), acquire()], weight: 1 },
        { steps: [delay(recipe.time), pulse(o, 90), acquire()], weight: -1 },
      ];
    case 'cross-polarisation-ideal':
      return one({ polarise: { from: recipe.from } });
  }
}

function echo(o: string, tau: number): Step[] {
  return [delay(tau), pulse(o, 180, 90), delay(tau)];
}

function saturate(nucleus: string, seconds: number): Step {
  return { saturate: { nucleus, seconds, nutationHz: NOE_NUTATION } };
}

/** First pulse and receiver at 0 and 180 degrees, so that the observed isotope's own polarisation cancels. */
function twoScans(steps: (phase: number) => Step[]): Scan[] {
  return [0, 180].map((phase) => ({ steps: [...steps(phase), acquire(phase)], weight: 0.5 }));
}

function ineptSteps(recipe: Extract<Recipe, { recipe: 'inept' }>, o: string, phase: number): Step[] {
  const { from: f, refocused, multiplicity } = recipe;
  const j = Math.abs(recipe.j);
  const quarter = delay(1 / (4 * j));
  const refocus = delay(Math.asin(1 / Math.sqrt(multiplicity)) / (2 * Math.PI * j));
  return [
    ...[pulse(f, 90, phase), quarter, pulse(f, 180), pulse(o, 180), quarter, pulse(f, 90, 90)],
    pulse(o, 90, refocused ? 90 : 0),
    ...(refocused ? [refocus, pulse(f, 180), pulse(o, 180), refocus] : []),
  ];
}

function deptSteps(recipe: Extract<Recipe, { recipe: 'dept' }>, o: string, phase: number): Step[] {
  const { from: f, theta } = recipe;
  const half = delay(1 / (2 * Math.abs(recipe.j)));
  return [
    ...[pulse(f, 90, phase), half, pulse(f, 180), pulse(o, 90, 90), half],
    ...[pulse(f, theta, 90), pulse(o, 180), half],
  ];
}

/** Each row of the cycle replaces the phases of the pulses in order, then the receiver's. */
function freeScans({ steps, phaseCycle }: FreeSequence): Scan[] {
  if (!phaseCycle) return [{ steps, weight: 1 }];
  return phaseCycle.map((row) => {
    let next = 0;
    const phased = steps.map((step): Step => {
      if ('pulse' in step) return { pulse: { ...step.pulse, phase: row[next++] } };
      if ('acquire' in step) return { acquire: { phase: row[row.length - 1] } };
      return step;
    });
    return { steps: phased, weight: 1 / phaseCycle.length };
  });
}
