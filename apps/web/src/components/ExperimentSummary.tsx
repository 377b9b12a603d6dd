import type { Experiment } from '@heddle/shared';
import type { Run } from '../api/types';
import { describeExperiment } from '../lib/experiment';
import { Isotope } from './Isotope';

/** The experiment of a run in a line: observed nuclide, field, sequence, kind of sample. */
export function ExperimentSummary({ run }: { run: Pick<Run, 'experiment'> }) {
  // OpenAPI knows the document as an open object; the server stores only what the shared schema accepted.
  const { observe, field, sequence, sample } = describeExperiment(run.experiment as unknown as Experiment);
  const rest = [field, sequence, sample].filter(Boolean).join(', ');
  return (
    <span title={`${observe} at ${rest}`}>
      <Isotope name={observe} /> at {rest}
    </span>
  );
}
