import { Anchor, Button, CloseButton, Group, NativeSelect, Stack, Text, Textarea, TextInput } from '@mantine/core';
import { scansOf, type SpinSystem, type Step } from '@heddle/shared';
import { PulseDiagram } from './PulseDiagram';
import { newStep, STEP_KINDS, writeSteps, type StepKind, type StepRow } from './logic/steps';
import type { ExperimentState } from './useExperiment';

/** The sequence as a diagram; a recipe can be turned into steps, which are then edited as a table beside the diagram. */
export function StepsEditor({ experiment, system }: { experiment: ExperimentState; system: SpinSystem | null }) {
  const { draft, checked, edit } = experiment;
  const scans = checked.experiment ? scansOf(checked.experiment) : [];
  const steps = scans[0]?.steps.filter((step): step is Step => !('polarise' in step)) ?? [];
  const setSteps = (rows: readonly StepRow[]) => edit((now) => ({ ...now, steps: rows }));
  return (
    <Stack gap={6}>
      {steps.length > 0 && <PulseDiagram steps={steps} observe={draft.cells.observe} />}
      {draft.steps === null ? (
        steps.length > 0 && (
          <Anchor component="button" type="button" size="sm" onClick={() => toSteps(experiment)}>
            Edit as steps
          </Anchor>
        )
      ) : (
        <>
          {draft.steps.map((row, i) => (
            <StepFields
              key={row.key}
              row={row}
              index={i}
              errors={checked.errors}
              nuclei={system?.nuclei.map(({ id }) => id) ?? []}
              onChange={(next) => setSteps(draft.steps!.map((old) => (old.key === row.key ? next : old)))}
              onRemove={() => setSteps(draft.steps!.filter((old) => old.key !== row.key))}
            />
          ))}
          <Group gap="xs">
            <NativeSelect
              size="xs"
              aria-label="Add a step"
              value=""
              data={[
                { value: '', label: 'Add a step ...' },
                ...Object.entries(STEP_KINDS).map(([value, { label }]) => ({ value, label })),
              ]}
              onChange={(event) => {
                const kind = event.currentTarget.value as StepKind | '';
                if (kind) setSteps(inserted(draft.steps!, newStep(kind)));
              }}
            />
            <Button size="xs" variant="default" onClick={() => edit((now) => ({ ...now, steps: null }))}>
              Back to a recipe
            </Button>
          </Group>
          {checked.errors.get('sequence.steps') && (
            <Text size="sm" c="var(--madder)" role="alert">
              {checked.errors.get('sequence.steps')}
            </Text>
          )}
          <Textarea
            label="Phase cycle"
            description="One row a line: a phase for each pulse, then the receiver's, in degrees."
            autosize
            minRows={1}
            value={draft.phaseCycle}
            error={[...checked.errors].find(([path]) => path.startsWith('sequence.phaseCycle'))?.[1]}
            onChange={(event) => {
              const phaseCycle = event.currentTarget.value;
              edit((now) => ({ ...now, phaseCycle }));
            }}
          />
        </>
      )}
    </Stack>
  );
}

/** A recipe of several scans becomes steps with a phase cycle where its scans differ in phases only. */
function toSteps({ checked, edit }: ExperimentState): void {
  const scans = scansOf(checked.experiment!);
  const steps = scans[0].steps.filter((step): step is Step => !('polarise' in step));
  const phases = scans.map((scan) =>
    scan.steps.flatMap((step) =>
      'pulse' in step ? [step.pulse.phase] : 'acquire' in step ? [step.acquire.phase] : [],
    ),
  );
  const cycle =
    scans.length > 1 && scans.every(({ weight }) => weight > 0) ? phases.map((row) => row.join(' ')).join('\n') : '';
  edit((now) => ({ ...now, steps: writeSteps(steps), phaseCycle: cycle }));
}

/** A new step goes before the acquisition that ends the sequence. */
function inserted(rows: readonly StepRow[], row: StepRow): StepRow[] {
  const end =
    rows.length > 0 && rows[rows.length - 1].kind === 'acquire' && row.kind !== 'acquire'
      ? rows.length - 1
      : rows.length;
  return [...rows.slice(0, end), row, ...rows.slice(end)];
}

function StepFields({
  row,
  index,
  errors,
  nuclei,
  onChange,
  onRemove,
}: {
  row: StepRow;
  index: number;
  errors: ReadonlyMap<string, string>;
  nuclei: readonly string[];
  onChange(row: StepRow): void;
  onRemove(): void;
}) {
  const { label, fields } = STEP_KINDS[row.kind];
  const base = `sequence.steps[${index}]`;
  return (
    <Group gap={6} align="flex-end" wrap="wrap" role="group" aria-label={`Step ${index + 1}: ${label}`}>
      <Text size="sm" w={76} pb={6}>
        {index + 1}. {label}
      </Text>
      {fields.map(({ field, label: name, unit }) => {
        const path =
          row.kind === 'delay' || row.kind === 'decouple' ? `${base}.${field}` : `${base}.${row.kind}.${field}`;
        return (
          <TextInput
            key={field}
            size="xs"
            w={field === 'on' ? 56 : 68}
            label={unit ? `${name}, ${unit}` : name}
            list={field === 'nucleus' ? 'step-nuclei' : undefined}
            value={row.cells[field] ?? ''}
            error={errors.get(path)}
            onChange={(event) => onChange({ ...row, cells: { ...row.cells, [field]: event.currentTarget.value } })}
          />
        );
      })}
      {errors.get(base) && (
        <Text size="xs" c="var(--madder)">
          {errors.get(base)}
        </Text>
      )}
      <CloseButton size="sm" aria-label={`Remove step ${index + 1}`} onClick={onRemove} />
      <datalist id="step-nuclei">
        {nuclei.map((id) => (
          <option key={id} value={id} />
        ))}
      </datalist>
    </Group>
  );
}
