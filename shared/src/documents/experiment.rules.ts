import { formatPath, type DocumentError } from './errors.js';
import type { Experiment, FreeSequence, Step } from './experiment.schema.js';

type Refuse = (keys: readonly PropertyKey[], message: string) => void;

/** The rules that hold between the fields of one experiment. */
export function checkExperiment(experiment: Experiment): DocumentError[] {
  const errors: DocumentError[] = [];
  const refuse: Refuse = (keys, message) => errors.push({ path: formatPath(keys), message });
  const { acquisition, processing, sequence, decouple, observe, sample } = experiment;

  checkDecoupled(decouple, observe, ['decouple'], refuse);
  const total = Math.max(acquisition.points, processing.zeroFill);
  if (processing.zeroFill > 0 && processing.zeroFill < acquisition.points) {
    refuse(
      ['processing', 'zeroFill'],
      `zero filling keeps all ${acquisition.points} points; give 0 or more points than that`,
    );
  } else if (total % 2 !== 0) {
    refuse(
      processing.zeroFill > 0 ? ['processing', 'zeroFill'] : ['acquisition', 'points'],
      'the spectrum needs an even number of points',
    );
  }
  if ('steps' in sequence) checkSteps(sequence, experiment, refuse);
  else if ('from' in sequence && sequence.from === observe) {
    refuse(['sequence', 'from'], `polarisation comes from another isotope than the observed ${observe}`);
  }
  if (sample.kind !== 'solution' && experiment.relaxation === 'redfield') {
    refuse(['relaxation'], 'redfield is for isotropic tumbling, that is for solutions');
  }
  if (sample.kind === 'spinning') checkSpinning(sequence, refuse);
  return errors;
}

function checkDecoupled(
  isotopes: readonly string[],
  observe: string,
  keys: readonly PropertyKey[],
  refuse: Refuse,
): void {
  isotopes.forEach((isotope, i) => {
    if (isotope === observe) refuse([...keys, i], `the observed isotope can't be decoupled`);
    if (isotopes.indexOf(isotope) < i) refuse([...keys, i], `${isotope} is listed already`);
  });
}

function checkSteps(sequence: FreeSequence, experiment: Experiment, refuse: Refuse): void {
  const { steps, phaseCycle } = sequence;
  const at = (i: number, ...rest: PropertyKey[]) => ['sequence', 'steps', i, ...rest];
  const acquires = steps.flatMap((step, i) => ('acquire' in step ? [i] : []));
  if (acquires.length === 0) refuse(['sequence', 'steps'], 'the last step must be an acquire step');
  acquires.forEach((i, nth) => {
    if (nth > 0) refuse(at(i, 'acquire'), 'a sequence acquires once');
    else if (i !== steps.length - 1 && acquires.length === 1) refuse(at(i, 'acquire'), 'acquire is the last step');
  });
  steps.forEach((step, i) => {
    if ('pulse' in step && step.pulse.offsetHz !== undefined && step.pulse.seconds === undefined) {
      refuse(at(i, 'pulse', 'offsetHz'), 'an ideal pulse has no offset; give seconds too');
    }
    if ('decouple' in step) checkDecoupled(step.decouple, experiment.observe, at(i, 'decouple'), refuse);
  });
  const columns = steps.filter((step) => 'pulse' in step).length + 1;
  phaseCycle?.forEach((row, i) => {
    if (row.length !== columns) {
      refuse(
        ['sequence', 'phaseCycle', i],
        `a row has one phase for each of the ${columns - 1} pulses and one for the receiver, not ${row.length}`,
      );
    }
  });
}

function checkSpinning(sequence: Experiment['sequence'], refuse: Refuse): void {
  const onlyIdeal = 'only ideal pulses may stand before the acquisition of a spinning sample';
  if ('steps' in sequence) {
    sequence.steps.forEach((step, i) => {
      if (!isIdealPulse(step) && !('acquire' in step)) refuse(['sequence', 'steps', i], onlyIdeal);
    });
  } else if (sequence.recipe !== 'pulse-acquire' && sequence.recipe !== 'cross-polarisation-ideal') {
    refuse(['sequence', 'recipe'], onlyIdeal);
  }
}

function isIdealPulse(step: Step): boolean {
  return 'pulse' in step && step.pulse.seconds === undefined;
}
