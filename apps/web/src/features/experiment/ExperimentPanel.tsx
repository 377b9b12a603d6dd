import { Button, Group, NativeSelect, Stack, Text, Title } from '@mantine/core';
import { useMutation } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { EngineError, estimateCost, type Experiment, type Report, type SpinSystem } from '@heddle/shared';
import { client, unwrap } from '../../api/client';
import type { System } from '../../api/types';
import { useCommands } from '../../lib/commands';
import { formatSeconds } from '../../lib/format';
import { notifyDone, notifyFailure } from '../../lib/forms';
import { LeftOut } from '../report/LeftOut';
import { NewSeries } from '../series/NewSeries';
import { AskFields, Field, IsotopeChecks } from './fields';
import { asksOf, choose, setAsk } from './logic/experiment-draft';
import { RECIPES, RELAXATIONS, SAMPLES } from './logic/recipes';
import { StepsEditor } from './StepsEditor';
import type { ExperimentState } from './useExperiment';

interface Props {
  labId: string;
  system: System | null;
  /** The system as typed, null while it is not sound. */
  document: SpinSystem | null;
  revision: number;
  changed: boolean;
  experiment: ExperimentState;
  report: Report | null;
  saveFirst(): Promise<{ systemId: string; revision: number }>;
}

/** The experiment to predict, its cost, and the button that queues it. */
export function ExperimentPanel({ labId, system, document, changed, experiment, report, saveFirst }: Props) {
  const { draft, checked, edit } = experiment;
  const navigate = useNavigate();
  const [asking, setAsking] = useState(false);
  const run = useMutation({
    mutationFn: async () => {
      const saved = await saveFirst();
      return unwrap(
        client.POST('/api/labs/{labId}/runs', {
          params: { path: { labId } },
          body: { ...saved, experiment: { ...checked.experiment! } },
        }),
      );
    },
    onSuccess: async ({ id, identical }) => {
      if (identical) notifyDone('The same run was there already: here it is.');
      await navigate(`/labs/${labId}/runs/${id}`);
    },
    onError: (error) => notifyFailure('Not queued', error),
  });
  const possible = checked.experiment !== null && document !== null && !run.isPending;
  useCommands([
    { id: 'series.new', label: 'Series of runs', canRun: () => possible, run: () => setAsking(true) },
    {
      id: 'run.queue',
      label: 'Run this experiment',
      shortcut: 'mod+Enter',
      canRun: () => possible,
      run: () => run.mutate(),
    },
  ]);
  const isotopes = [...new Set(document?.nuclei.map(({ isotope }) => isotope) ?? [draft.cells.observe])];
  const ask = (field: string) => (text: string) => edit((now) => setAsk(now, field, text));
  const field = (name: string, label: string, unit?: string) => (
    <Field
      label={label}
      unit={unit}
      value={draft.cells[name] ?? ''}
      error={checked.errors.get(name)}
      onChange={ask(name)}
    />
  );
  return (
    <section aria-labelledby="experiment-title">
      <Title order={2} id="experiment-title" fz={17} mb={10}>
        Experiment
      </Title>
      <Stack gap="sm">
        <Group grow align="flex-start">
          <NativeSelect
            label="Observe"
            data={[...new Set([...isotopes, draft.cells.observe])]}
            value={draft.cells.observe}
            error={checked.errors.get('observe')}
            onChange={(event) => ask('observe')(event.currentTarget.value)}
          />
          {field('protonMHz', '1H frequency', 'MHz')}
        </Group>
        <IsotopeChecks
          label="Decouple"
          isotopes={isotopes.filter((isotope) => isotope !== draft.cells.observe)}
          chosen={draft.decouple}
          error={checked.errors.get('decouple') ?? checked.errors.get('decouple[0]')}
          onChange={(decouple) => edit((now) => ({ ...now, decouple }))}
        />
        <NativeSelect
          label="Sample"
          data={SAMPLES.map(({ value, label }) => ({ value, label }))}
          value={draft.cells['sample.kind']}
          onChange={({ currentTarget: { value } }) => edit((now) => choose(now, 'sample.kind', value))}
        />
        <AskFields
          asks={asksOf(draft, 'sample.kind')}
          draft={draft}
          errors={checked.errors}
          system={document}
          onChange={ask}
        />
        {draft.steps ? (
          <StepsEditor experiment={experiment} system={document} />
        ) : (
          <>
            <NativeSelect
              label="Sequence"
              data={RECIPES.map(({ value, label }) => ({ value, label }))}
              value={draft.cells['sequence.recipe']}
              onChange={({ currentTarget: { value } }) => edit((now) => choose(now, 'sequence.recipe', value))}
            />
            <AskFields
              asks={asksOf(draft, 'sequence.recipe')}
              draft={draft}
              errors={checked.errors}
              system={document}
              onChange={ask}
            />
            <StepsEditor experiment={experiment} system={document} />
          </>
        )}
        <NativeSelect
          label="Relaxation"
          data={RELAXATIONS.map(({ value, label }) => ({ value, label }))}
          value={draft.cells.relaxation}
          error={checked.errors.get('relaxation')}
          onChange={(event) => ask('relaxation')(event.currentTarget.value)}
        />
        <Group grow align="flex-start">
          {field('lineWidth', 'Line width', 'Hz')}
          {field('temperature', 'Temperature', 'K')}
        </Group>
        <Group grow align="flex-start">
          {field('acquisition.centre', 'Centre', 'ppm')}
          {field('acquisition.width', 'Width', 'Hz')}
        </Group>
        <Group grow align="flex-start">
          {field('acquisition.points', 'Points')}
          {field('processing.zeroFill', 'Zero fill to')}
        </Group>
        {checked.systemErrors.map(({ path, message }) => (
          <Text key={path} size="sm" c="var(--madder)" role="alert">
            {path}: {message}
          </Text>
        ))}
        <Cost system={document} experiment={checked.experiment} />
        <Group gap="xs" wrap="nowrap">
          <Button flex={1} onClick={() => run.mutate()} disabled={!possible} loading={run.isPending}>
            {changed || !system ? 'Save and run' : 'Run'}
          </Button>
          <Button variant="default" disabled={!possible} onClick={() => setAsking(true)}>
            Series
          </Button>
        </Group>
      </Stack>
      {report && <LeftOut report={report} brief />}
      {asking && document && checked.experiment && (
        <NewSeries
          labId={labId}
          system={document}
          experiment={checked.experiment}
          saveFirst={saveFirst}
          onClose={() => setAsking(false)}
        />
      )}
    </section>
  );
}

/** What the run will take, before it is queued. */
function Cost({ system, experiment }: { system: SpinSystem | null; experiment: Experiment | null }) {
  const words = useMemo(() => (system && experiment ? costWords(system, experiment) : null), [system, experiment]);
  return (
    <Text size="sm" c="dimmed" mih={22} role="status">
      {words}
    </Text>
  );
}

function costWords(system: SpinSystem, experiment: Experiment): string {
  try {
    const { seconds, bytes } = estimateCost(system, experiment);
    const memory = bytes > 64 * 2 ** 20 ? ` and ${Math.ceil(bytes / 2 ** 20)} MiB` : '';
    return `About ${seconds < 0.1 ? 'an instant' : formatSeconds(seconds)}${memory} on one core`;
  } catch (error) {
    return error instanceof EngineError ? error.message : 'The cost is not known.';
  }
}
