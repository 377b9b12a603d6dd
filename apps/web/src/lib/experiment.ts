import type { Experiment } from '@heddle/shared';

const RECIPES: Record<string, string> = {
  'pulse-acquire': 'pulse and acquire',
  'spin-echo': 'spin echo',
  cpmg: 'CPMG',
  'inversion-recovery': 'inversion recovery',
  'saturation-recovery': 'saturation recovery',
  'quadrupole-echo': 'quadrupole echo',
  inept: 'INEPT',
  dept: 'DEPT',
  'noe-difference': 'NOE difference',
  'cross-polarisation-ideal': 'cross polarisation',
};

/** The words by which people tell experiments apart. `sample` is empty for a solution. */
export function describeExperiment(experiment: Pick<Experiment, 'observe' | 'protonMHz' | 'sequence' | 'sample'>) {
  const { observe, protonMHz, sequence, sample } = experiment;
  return {
    observe,
    field: `${Number(protonMHz.toFixed(2))} MHz`,
    sequence: 'recipe' in sequence ? (RECIPES[sequence.recipe] ?? sequence.recipe) : 'own sequence',
    sample:
      sample.kind === 'solution'
        ? ''
        : sample.kind === 'spinning'
          ? `spinning at ${sample.rateHz / 1000} kHz`
          : sample.kind,
  };
}
