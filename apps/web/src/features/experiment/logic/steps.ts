import type { Step } from '@heddle/shared';
import { newKey } from '../../editor/logic/draft';
import { readNumber, writeNumber } from '../../editor/logic/numbers';

/** A step of a free sequence while it is edited. */
export interface StepRow {
  readonly key: string;
  readonly kind: StepKind;
  readonly cells: Readonly<Record<string, string>>;
}

export type StepKind = 'pulse' | 'delay' | 'spoil' | 'select' | 'decouple' | 'saturate' | 'acquire';

export interface StepField {
  readonly field: string;
  readonly label: string;
  readonly unit?: string;
  readonly kind: 'isotope' | 'isotopes' | 'nucleus' | 'number';
  readonly start: string;
  readonly optional?: boolean;
}

/** What each kind of step asks for. */
export const STEP_KINDS: Readonly<Record<StepKind, { label: string; fields: readonly StepField[] }>> = {
  pulse: {
    label: 'Pulse',
    fields: [
      { field: 'on', label: 'On', kind: 'isotope', start: '1H' },
      { field: 'flip', label: 'Flip', unit: '\u00b0', kind: 'number', start: '90' },
      { field: 'phase', label: 'Phase', unit: '\u00b0', kind: 'number', start: '0' },
      { field: 'seconds', label: 'Length', unit: 's', kind: 'number', start: '', optional: true },
      { field: 'offsetHz', label: 'Offset', unit: 'Hz', kind: 'number', start: '', optional: true },
    ],
  },
  delay: { label: 'Delay', fields: [{ field: 'delay', label: 'Time', unit: 's', kind: 'number', start: '0.01' }] },
  spoil: { label: 'Spoil', fields: [] },
  select: {
    label: 'Select coherence',
    fields: [
      { field: 'on', label: 'On', kind: 'isotope', start: '1H' },
      { field: 'order', label: 'Order', kind: 'number', start: '-1' },
    ],
  },
  decouple: {
    label: 'Decouple from here',
    fields: [{ field: 'decouple', label: 'Isotopes', kind: 'isotopes', start: '', optional: true }],
  },
  saturate: {
    label: 'Saturate',
    fields: [
      { field: 'nucleus', label: 'Nucleus', kind: 'nucleus', start: '' },
      { field: 'seconds', label: 'Time', unit: 's', kind: 'number', start: '5' },
      { field: 'nutationHz', label: 'Nutation', unit: 'Hz', kind: 'number', start: '50' },
    ],
  },
  acquire: {
    label: 'Acquire',
    fields: [{ field: 'phase', label: 'Receiver', unit: '\u00b0', kind: 'number', start: '0' }],
  },
};

export function newStep(kind: StepKind): StepRow {
  return {
    key: newKey(),
    kind,
    cells: Object.fromEntries(STEP_KINDS[kind].fields.map(({ field, start }) => [field, start])),
  };
}

export function writeSteps(steps: readonly StepInput[]): StepRow[] {
  return steps.map((step) => {
    const [kind, value] = Object.entries(step)[0] as [StepKind, unknown];
    const inner = typeof value === 'object' && value !== null && !Array.isArray(value) ? value : { [kind]: value };
    const cells = Object.entries(inner as Record<string, unknown>).map(([field, part]) => [field, writePart(part)]);
    return { key: newKey(), kind, cells: Object.fromEntries(cells) as Record<string, string> };
  });
}

type StepInput = Step | Record<string, unknown>;

function writePart(part: unknown): string {
  if (Array.isArray(part)) return part.join(' ');
  return typeof part === 'number' ? writeNumber(part) : String(part);
}

/** The sequence that the rows say; what can't be read is noted by its document path. */
export function readSteps(
  rows: readonly StepRow[],
  phaseCycle: string,
  unread: Map<string, string>,
): Record<string, unknown> {
  const steps = rows.map(({ kind, cells }, i) => {
    const inner: Record<string, unknown> = {};
    for (const { field, kind: of } of STEP_KINDS[kind].fields) {
      const text = (cells[field] ?? '').trim();
      if (of === 'isotopes') inner[field] = text.split(/[\s,]+/).filter((isotope) => isotope !== '');
      else if (text === '') continue;
      else if (of === 'number') {
        const read = readNumber(text);
        inner[field] = read.ok ? read.value : text;
        const flat = kind === 'delay';
        if (!read.ok) unread.set(`sequence.steps[${i}].${flat ? field : `${kind}.${field}`}`, read.message);
      } else inner[field] = text;
    }
    if (kind === 'spoil') return { spoil: true };
    return kind === 'delay' || kind === 'decouple' ? inner : { [kind]: inner };
  });
  if (phaseCycle.trim() === '') return { steps };
  const rowsOfPhases = phaseCycle
    .trim()
    .split('\n')
    .map((line, i) =>
      line
        .trim()
        .split(/[\s,;]+/)
        .map((text, k) => {
          const read = readNumber(text);
          if (!read.ok) unread.set(`sequence.phaseCycle[${i}][${k}]`, read.message);
          return read.ok ? read.value : text;
        }),
    );
  return { steps, phaseCycle: rowsOfPhases };
}
