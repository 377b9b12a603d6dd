import { Button, SimpleGrid } from '@mantine/core';
import type { Processing } from '@heddle/shared';
import { useState } from 'react';
import { readNumber, writeNumber } from '../../editor/logic/numbers';
import { Field } from '../../experiment/fields';
import type { ViewState } from '../logic/view-state';

const FIELDS: readonly { key: keyof Processing; label: string; unit?: string; step: number; least?: number }[] = [
  { key: 'exponential', label: 'Exponential', unit: 'Hz', step: 0.1 },
  { key: 'gaussian', label: 'Gaussian', unit: 'Hz', step: 0.1, least: 0 },
  { key: 'zeroFill', label: 'Zero fill to', unit: 'points', step: 2, least: 0 },
  { key: 'phase0', label: 'Phase 0', unit: '\u00b0', step: 5 },
  { key: 'phase1', label: 'Phase 1', unit: '\u00b0', step: 5 },
];

/** Apodisation, zero filling and phase: act at once, on the FID that came with the run. */
export function ProcessingPanel({
  own,
  view,
  points,
  onChange,
}: {
  own: Processing;
  view: ViewState;
  points: number;
  onChange(processing: Partial<Processing>): void;
}) {
  const now = { ...own, ...view.processing };
  const [typed, setTyped] = useState<Partial<Record<keyof Processing, string>>>({});
  const errorOf = (key: keyof Processing, least: number | undefined): string | undefined => {
    const text = typed[key];
    if (text === undefined) return undefined;
    const read = readNumber(text);
    if (!read.ok) return read.message;
    if (least !== undefined && read.value < least) return `must be at least ${least}`;
    if (key === 'zeroFill' && read.value > 4194304) return 'must be at most 4194304';
    if (key === 'zeroFill' && read.value > 0 && read.value < points) return `must be 0 or at least ${points}`;
    return undefined;
  };
  const type = (key: keyof Processing, least: number | undefined) => (text: string) => {
    setTyped({ ...typed, [key]: text });
    const read = readNumber(text);
    const refused =
      !read.ok ||
      (least !== undefined && read.value < least) ||
      (key === 'zeroFill' && read.value > 0 && read.value < points);
    if (!refused && read.value <= 4194304)
      onChange({ ...view.processing, [key]: key === 'zeroFill' ? Math.round(read.value) : read.value });
  };
  return (
    <>
      <SimpleGrid cols={{ base: 2, sm: 3, lg: 5 }} spacing="sm">
        {FIELDS.map(({ key, label, unit, step, least }) => (
          <Field
            key={key}
            label={label}
            unit={unit}
            step={step}
            value={typed[key] ?? writeNumber(now[key])}
            error={errorOf(key, least)}
            onChange={type(key, least)}
          />
        ))}
      </SimpleGrid>
      <Button
        mt="md"
        size="xs"
        variant="default"
        disabled={Object.keys(view.processing).length === 0}
        onClick={() => {
          setTyped({});
          onChange({});
        }}
      >
        As the run was processed
      </Button>
    </>
  );
}
