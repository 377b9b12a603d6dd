import type { Experiment } from '@heddle/shared';

/** Points of a live picture. Enough for the widest screen zoomed in ten times; more only costs time. */
const POINTS = 32768;
/** Orientations of a live picture of an oriented sample: a rough pattern at once rather than a smooth one later. */
const ORIENTATIONS = 300;

/** The experiment as it is computed while a person types: the same physics, with no more points than a screen can show. */
export function previewOf(experiment: Experiment): Experiment {
  const points = Math.min(experiment.acquisition.points, POINTS);
  const zeroFill = Math.max(points, Math.min(experiment.processing.zeroFill || 2 * points, POINTS));
  const { sample } = experiment;
  return {
    ...experiment,
    sample:
      'orientations' in sample ? { ...sample, orientations: Math.min(sample.orientations, ORIENTATIONS) } : sample,
    acquisition: { ...experiment.acquisition, points },
    processing: { ...experiment.processing, zeroFill: zeroFill % 2 === 0 ? zeroFill : zeroFill + 1 },
  };
}
