import { ActionIcon, Alert, Anchor, Button, Group, Text, TextInput, Tooltip } from '@mantine/core';
import { useDocumentTitle } from '@mantine/hooks';
import { useMemo, useState } from 'react';
import { Link } from 'react-router-dom';
import type { SpinSystem } from '@heddle/shared';
import type { System } from '../../api/types';
import { useCommands } from '../../lib/commands';
import { ExperimentPanel } from '../experiment/ExperimentPanel';
import { useExperiment } from '../experiment/useExperiment';
import { LiveSpectrum } from '../live/LiveSpectrum';
import { useLive } from '../live/useLive';
import type { Range } from '../viewer/logic/axis';
import { Weave } from '../weave/Weave';
import { Conflict } from './Conflict';
import type { Draft } from './logic/draft';
import { setCell, setField, setPairJ } from './logic/edit';
import { Revisions } from './Revisions';
import { Tables } from './Tables';
import { useDraft } from './useDraft';
import { useSave } from './useSave';
import classes from './Bench.module.css';

interface BenchProps {
  labId: string;
  /** Null for a system that is not saved yet. */
  system: System | null;
  revision: number;
  start: Draft;
}

/** The system editor: the weave over its live spectrum, the tables below, the experiment beside them. */
export function Bench({ labId, system, revision, start }: BenchProps) {
  const state = useDraft(labId, system?.id ?? null, revision, start);
  const { draft, checked, edit } = state;
  const save = useSave(labId, system, state);
  const sound = useLastSound(checked.system);
  const experiment = useExperiment(labId, system?.id ?? null, checked.system);
  const live = useLive(checked.system, experiment.checked.experiment);
  const [selected, setSelected] = useState<string | null>(null);
  const [range, setRange] = useState<Range | null>(null);
  useDocumentTitle(`${draft.name || 'New system'} \u00b7 Heddle`);
  useCommands([
    { id: 'system.save', label: 'Save as a revision', shortcut: 'mod+S', canRun: () => save.possible, run: save.now },
    { id: 'system.undo', label: 'Undo', shortcut: 'mod+Z', canRun: () => state.canUndo, run: state.undo },
    { id: 'system.redo', label: 'Redo', shortcut: 'mod+shift+Z', canRun: () => state.canRedo, run: state.redo },
  ]);

  const editCell = (id: string, field: string, text: string, done: boolean) => {
    const row = draft.nuclei.find(({ cells }) => cells.id?.trim() === id);
    if (row) edit((now) => setCell(now, 'nuclei', row.key, field, text), done ? null : `drag/${id}`);
  };
  const observe = live.picture?.experiment.observe;
  const spectrum = live.picture?.spectrum;
  const shown = range ?? (spectrum && { high: spectrum.firstPpm, low: spectrum.lastPpm });
  return (
    <div className={classes.page}>
      <BenchHeader system={system} revision={revision} state={state} save={save} labId={labId} />
      {state.restored && state.changed && (
        <Alert className={classes.notice} color="weld" variant="outline" role="status">
          These are your unsaved edits from an earlier visit.{' '}
          <Anchor component="button" type="button" onClick={state.discard}>
            Go back to revision {revision || 'nothing'}
          </Anchor>
        </Alert>
      )}
      <div className={classes.bench}>
        <div className={classes.loom}>
          {sound ? (
            <Weave
              system={sound}
              observed={observe && shown ? { isotope: observe, ...shown } : undefined}
              selected={selected}
              onSelect={setSelected}
              onShift={(id, ppm, done) => editCell(id, 'shift', String(ppm), done)}
              onCoupling={(a, b, j, done) =>
                edit((now) => setPairJ(now, a, b, String(j)), done ? null : `drag/${a},${b}`)
              }
            />
          ) : (
            <Text c="dimmed" className={classes.emptyWeave}>
              Type a nucleus below, or paste rows from a spreadsheet: threads appear here, the spectrum under them.
            </Text>
          )}
          <LiveSpectrum
            live={live}
            range={range}
            onRange={setRange}
            experimentSound={experiment.checked.experiment !== null}
          />
          <Tables state={state} selected={selected} onSelect={setSelected} experiment={experiment.checked.experiment} />
        </div>
        <aside className={classes.side} aria-label="Experiment">
          <ExperimentPanel
            labId={labId}
            system={system}
            document={checked.system}
            revision={revision}
            changed={state.changed}
            experiment={experiment}
            report={live.picture?.report ?? null}
            saveFirst={save.saved}
          />
          {system && <Revisions labId={labId} system={system} shown={revision} />}
        </aside>
      </div>
      {save.conflict && <Conflict conflict={save.conflict} onMerge={save.merge} onClose={save.closeConflict} />}
    </div>
  );
}

/** The last version of the system that was sound, so that the weave stays while a value is being typed. */
function useLastSound(system: SpinSystem | null): SpinSystem | null {
  const [last, setLast] = useState(system);
  if (system && system !== last) setLast(system);
  return system ?? last;
}

function BenchHeader({
  labId,
  system,
  revision,
  state,
  save,
}: {
  labId: string;
  system: System | null;
  revision: number;
  state: ReturnType<typeof useDraft>;
  save: ReturnType<typeof useSave>;
}) {
  const { draft, checked, edit } = state;
  const problems = checked.errors.all;
  const list = useMemo(
    () =>
      problems
        .slice(0, 4)
        .map(({ place, message }) => `${place}: ${message}`)
        .join('\n'),
    [problems],
  );
  return (
    <header className={classes.header}>
      <div className={classes.title}>
        <TextInput
          aria-label="Name of the system"
          placeholder="Name of the system"
          classNames={{ input: classes.name }}
          value={draft.name}
          maxLength={200}
          onChange={({ currentTarget: { value } }) => edit((now) => setField(now, 'name', value), 'name')}
          error={draft.nuclei.length > 0 ? checked.errors.fields.get('name') : undefined}
        />
        <Text size="sm" c="dimmed">
          {system ? `Revision ${revision} of ${system.latestRevision}, by ${system.owner.name}` : 'Not saved yet'}
          {state.changed && ' \u00b7 edited'}
          {system && (
            <>
              {' \u00b7 '}
              <Anchor component={Link} to={`/labs/${labId}/runs?system=${system.id}`} size="sm">
                its runs
              </Anchor>
            </>
          )}
        </Text>
      </div>
      <Group gap="xs" className={classes.actions}>
        <TextInput
          aria-label="Note for the revision"
          placeholder="What changed"
          className={classes.note}
          value={save.note}
          maxLength={2000}
          onChange={({ currentTarget: { value } }) => save.setNote(value)}
        />
        <Tooltip label="Undo (Ctrl+Z)">
          <ActionIcon variant="default" size="lg" aria-label="Undo" disabled={!state.canUndo} onClick={state.undo}>
            {'\u21b6'}
          </ActionIcon>
        </Tooltip>
        <Tooltip label="Redo (Ctrl+Shift+Z)">
          <ActionIcon variant="default" size="lg" aria-label="Redo" disabled={!state.canRedo} onClick={state.redo}>
            {'\u21b7'}
          </ActionIcon>
        </Tooltip>
        <Tooltip label={list} disabled={problems.length === 0} multiline maw={420} style={{ whiteSpace: 'pre-line' }}>
          <Button onClick={save.now} loading={save.saving} disabled={!save.possible}>
            {system ? 'Save revision' : 'Save system'}
          </Button>
        </Tooltip>
      </Group>
    </header>
  );
}
