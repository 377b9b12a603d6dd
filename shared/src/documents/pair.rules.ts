import { formatPath, type DocumentError } from './errors.js';
import type { Experiment } from './experiment.schema.js';
import type { SpinSystem } from './system.schema.js';

/** What is wrong between a sound system and a sound experiment, by the document that holds the field. */
export interface PairErrors {
  system: DocumentError[];
  experiment: DocumentError[];
}

/** The rules that need both documents. */
export function checkPair(system: SpinSystem, experiment: Experiment): PairErrors {
  const errors: PairErrors = { system: [], experiment: [] };
  const refuse = (where: keyof PairErrors, keys: readonly PropertyKey[], message: string) =>
    errors[where].push({ path: formatPath(keys), message });
  const isotopes = new Set(system.nuclei.map((nucleus) => nucleus.isotope));
  const ids = new Set(system.nuclei.map((nucleus) => nucleus.id));

  if (!isotopes.has(experiment.observe)) refuse('experiment', ['observe'], `the system has no ${experiment.observe}`);
  const { sequence } = experiment;
  if ('steps' in sequence) {
    sequence.steps.forEach((step, i) => {
      if ('saturate' in step && !ids.has(step.saturate.nucleus)) {
        refuse(
          'experiment',
          ['sequence', 'steps', i, 'saturate', 'nucleus'],
          `there is no nucleus '${step.saturate.nucleus}'`,
        );
      }
    });
  } else {
    if ('from' in sequence && !isotopes.has(sequence.from)) {
      refuse('experiment', ['sequence', 'from'], `the system has no ${sequence.from}`);
    }
    if (sequence.recipe === 'noe-difference' && !ids.has(sequence.saturate)) {
      refuse('experiment', ['sequence', 'saturate'], `there is no nucleus '${sequence.saturate}'`);
    }
  }
  if (experiment.relaxation === 'redfield') checkRedfield(system, refuse);
  if (experiment.relaxation === 't1-t2') checkRandomFields(system, experiment, refuse);
  return errors;
}

type Refuse = (where: keyof PairErrors, keys: readonly PropertyKey[], message: string) => void;

function checkRedfield(system: SpinSystem, refuse: Refuse): void {
  if (!system.tumbling) refuse('system', ['tumbling', 'tauC'], 'redfield relaxation needs the correlation time');
  const mechanisms =
    system.nuclei.some((n) => n.csa || n.quadrupole) || system.couplings.some((c) => c.dipolar !== undefined);
  if (!mechanisms) {
    refuse(
      'system',
      ['couplings'],
      'redfield relaxation needs a dipolar coupling (from positions or given), a shift tensor or a quadrupole',
    );
  }
}

/** t1-t2 takes 1/(pi lineWidth) where a nucleus gives no t2: that must not exceed twice its t1 either. */
function checkRandomFields(system: SpinSystem, experiment: Experiment, refuse: Refuse): void {
  system.nuclei.forEach((nucleus, i) => {
    const t2 = nucleus.t2 ?? 1 / (Math.PI * (nucleus.lineWidth ?? experiment.lineWidth));
    if (nucleus.t1 !== undefined && t2 > 2 * nucleus.t1 && nucleus.t2 === undefined) {
      refuse(
        'system',
        ['nuclei', i, 't1'],
        `t2 is 1/(pi lineWidth) = ${+t2.toPrecision(4)} s here, which is more than twice t1`,
      );
    }
  });
}
