import { Anchor, Button, Group, SegmentedControl, Skeleton, Text } from '@mantine/core';
import { useQueries, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import { larmorMHz, VARIED_UNITS } from '@heddle/shared';
import { seriesQuery } from '../../api/queries';
import { PageHeader } from '../../components/PageHeader';
import { Refusal } from '../../components/Refusal';
import { RunTable } from '../../components/RunTable';
import { useLab } from '../../lib/session';
import { fullRange, narrowest, type Range } from '../viewer/logic/axis';
import { stackTraces } from '../viewer/logic/compare-traces';
import { SpectrumPlot } from '../viewer/plot/SpectrumPlot';
import { resultQuery, type RunResult } from '../viewer/result';
import { QUANTITY_WORDS } from './logic/words';
import { MapPicture } from './MapPicture';

/** A series: its spectra as a stack or as a map, and its runs. */
export function SeriesPage() {
  const { labId } = useLab();
  const { seriesId = '' } = useParams();
  const series = useQuery(seriesQuery(labId, seriesId));
  if (series.error) return <Refusal error={series.error} retry={() => void series.refetch()} />;
  if (!series.data) return <Skeleton h={460} aria-label="Loading the series" />;
  const { name, system, vary, runs } = series.data;
  const done = runs.filter(({ state }) => state === 'done').length;
  const finished = done === runs.length;
  const base = `/api/labs/${labId}/series/${seriesId}`;
  return (
    <>
      <PageHeader
        title={name}
        lead={
          <>
            <Anchor component={Link} to={`/labs/${labId}/systems/${system.id}`} underline="always">
              {system.name}
            </Anchor>{' '}
            along {QUANTITY_WORDS[vary.quantity]}
            {vary.target && ` of ${vary.target}`}, {vary.values[0]} to {vary.values[vary.values.length - 1]}{' '}
            {VARIED_UNITS[vary.quantity]}; {done} of {runs.length} runs are done.
          </>
        }
        actions={
          finished && (
            <>
              <Button component="a" variant="default" href={`${base}/series.jdx`} download>
                JCAMP-DX
              </Button>
              <Button component="a" variant="default" href={`${base}/series.csv`} download>
                CSV
              </Button>
            </>
          )
        }
      />
      <Spectra
        labId={labId}
        runIds={runs.filter(({ state }) => state === 'done').map(({ id }) => id)}
        labels={runs.flatMap(({ state }, i) =>
          state === 'done' ? [`${vary.values[i]} ${VARIED_UNITS[vary.quantity]}`] : [],
        )}
      />
      <RunTable labId={labId} runs={runs} label="Runs of the series" />
    </>
  );
}

function Spectra({ labId, runIds, labels }: { labId: string; runIds: readonly string[]; labels: readonly string[] }) {
  const [as, setAs] = useState<'stack' | 'overlay' | 'map'>('stack');
  const [range, setRange] = useState<Range | null>(null);
  const replies = useQueries({ queries: runIds.map((id) => resultQuery(labId, id)) });
  const failed = replies.find(({ error }) => error)?.error;
  if (failed) return <Refusal error={failed} />;
  const results = replies.flatMap(({ data }) => (data ? [data] : []));
  if (runIds.length === 0) return <Text my="xl">The spectra appear here as their runs are done.</Text>;
  if (results.length < runIds.length) return <Skeleton h={460} aria-label="Loading the spectra" />;
  const full = unionRange(results);
  const shown = stackTraces(
    results.map(({ spectrum }, i) => ({ label: labels[i], spectrum })),
    as === 'stack' ? 'stack' : 'overlay',
  );
  const { observe, protonMHz } = results[0].experiment;
  return (
    <>
      <Group mb={6}>
        <SegmentedControl
          size="xs"
          aria-label="How the spectra are drawn"
          data={[
            { value: 'stack', label: 'Stack' },
            { value: 'overlay', label: 'Over one another' },
            { value: 'map', label: 'Map' },
          ]}
          value={as}
          onChange={(value) => setAs(value)}
        />
        <Button size="xs" variant="default" disabled={!range} onClick={() => setRange(null)}>
          Whole
        </Button>
      </Group>
      {as === 'map' ? (
        <MapPicture
          spectra={results.map(({ spectrum }) => spectrum)}
          labels={labels}
          range={range ?? full}
          height={420}
        />
      ) : (
        <SpectrumPlot
          label={`${results.length} spectra of the series, ${as === 'stack' ? 'stacked' : 'over one another'}`}
          traces={shown.map(({ label, spectrum: s }) => ({
            label,
            samples: { first: s.firstPpm, last: s.lastPpm, values: s.real },
          }))}
          full={full}
          range={range}
          onRange={setRange}
          height={420}
          least={narrowest(results[0].spectrum)}
          hzPerPpm={larmorMHz(observe, protonMHz)}
        />
      )}
      <Text size="sm" c="dimmed" my="sm">
        From below: {labels.join(', ')}.
      </Text>
    </>
  );
}

/** The stretch that holds every spectrum. */
function unionRange(results: readonly RunResult[]): Range {
  const ranges = results.map(({ spectrum }) => fullRange(spectrum));
  return { high: Math.max(...ranges.map(({ high }) => high)), low: Math.min(...ranges.map(({ low }) => low)) };
}
