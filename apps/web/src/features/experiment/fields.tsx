import { Checkbox, Group, NativeSelect, SimpleGrid, Switch, TextInput } from '@mantine/core';
import type { SpinSystem } from '@heddle/shared';
import { Isotope } from '../../components/Isotope';
import { stepNumber } from '../editor/logic/numbers';
import type { ExperimentDraft } from './logic/experiment-draft';
import type { Ask } from './logic/recipes';

/** A number as it is typed, stepped by the up and down keys. */
export function Field({
  label,
  unit,
  value,
  error,
  hint,
  step,
  onChange,
}: {
  label: string;
  unit?: string;
  value: string;
  error?: string;
  hint?: string;
  step?: number;
  onChange(text: string): void;
}) {
  return (
    <TextInput
      label={unit ? `${label}, ${unit}` : label}
      description={hint}
      inputMode="decimal"
      autoComplete="off"
      value={value}
      error={error}
      onChange={(event) => onChange(event.currentTarget.value)}
      onKeyDown={(event) => {
        if (!step || (event.key !== 'ArrowUp' && event.key !== 'ArrowDown')) return;
        event.preventDefault();
        onChange(stepNumber(value, event.key === 'ArrowUp' ? step : -step));
      }}
    />
  );
}

export function IsotopeChecks({
  label,
  isotopes,
  chosen,
  error,
  onChange,
}: {
  label: string;
  isotopes: readonly string[];
  chosen: readonly string[];
  error?: string;
  onChange(chosen: string[]): void;
}) {
  const all = [...new Set([...isotopes, ...chosen])];
  if (all.length === 0) return null;
  return (
    <Checkbox.Group label={label} value={[...chosen]} error={error} onChange={onChange}>
      <Group gap="md" mt={4}>
        {all.map((isotope) => (
          <Checkbox key={isotope} value={isotope} label={<Isotope name={isotope} />} />
        ))}
      </Group>
    </Checkbox.Group>
  );
}

/** What a recipe or a kind of sample asks for. */
export function AskFields({
  asks,
  draft,
  errors,
  system,
  onChange,
}: {
  asks: readonly Ask[];
  draft: ExperimentDraft;
  errors: ReadonlyMap<string, string>;
  system: SpinSystem | null;
  onChange(field: string): (text: string) => void;
}) {
  if (asks.length === 0) return null;
  return (
    <SimpleGrid cols={2} spacing="sm" verticalSpacing="sm">
      {asks.map((ask) => {
        const value = draft.cells[ask.field] ?? ask.start;
        const error = errors.get(ask.field.replace(/\.(\d+)$/, '[$1]'));
        const choices = choicesOf(ask, system);
        if (ask.kind === 'switch') {
          return (
            <Switch
              key={ask.field}
              label={ask.label}
              checked={value === 'true'}
              onChange={(event) => onChange(ask.field)(String(event.currentTarget.checked))}
            />
          );
        }
        if (choices) {
          return (
            <NativeSelect
              key={ask.field}
              label={ask.label}
              description={ask.hint}
              data={choices.includes(value) ? choices : [value, ...choices]}
              value={value}
              error={error}
              onChange={(event) => onChange(ask.field)(event.currentTarget.value)}
            />
          );
        }
        return (
          <Field
            key={ask.field}
            label={ask.label}
            unit={ask.unit}
            hint={ask.hint}
            step={ask.step}
            value={value}
            error={error}
            onChange={onChange(ask.field)}
          />
        );
      })}
    </SimpleGrid>
  );
}

function choicesOf({ kind, choices }: Ask, system: SpinSystem | null): string[] | null {
  if (kind === 'choice') return [...(choices ?? [])];
  if (kind === 'isotope') return [...new Set(system?.nuclei.map(({ isotope }) => isotope) ?? [])];
  if (kind === 'nucleus') return system?.nuclei.map(({ id }) => id) ?? [];
  return null;
}
