import { formatPath } from '@heddle/shared';

/** The tables of a spin system that are edited as rows of cells. */
export const TABLES = ['nuclei', 'couplings', 'states', 'exchange'] as const;
export type TableName = (typeof TABLES)[number];

/**
 * One column of a table. `field` is the path inside the row joined by dots: 'shift', 'csa.euler.0', 'j.Ha,Hb'.
 * `step` is what one press of the up arrow adds.
 */
export interface Column {
  readonly field: string;
  readonly label: string;
  readonly unit?: string;
  readonly kind: 'text' | 'number';
  readonly step?: number;
  /** Shown in an empty cell: the value that holds when nothing is typed. */
  readonly blank?: string;
  /** Other headings under which a spreadsheet may bring this column. */
  readonly aliases?: readonly string[];
  readonly width?: number;
}

export const NUCLEUS_COLUMNS: readonly Column[] = [
  { field: 'id', label: 'Nucleus', kind: 'text', aliases: ['id', 'name', 'label', 'atom'], width: 84 },
  { field: 'isotope', label: 'Isotope', kind: 'text', aliases: ['nuclide'], width: 72 },
  { field: 'count', label: 'Count', kind: 'number', step: 1, blank: '1', aliases: ['number', 'n'], width: 60 },
  {
    field: 'shift',
    label: 'Shift',
    unit: 'ppm',
    kind: 'number',
    step: 0.01,
    aliases: ['ppm', 'delta', '\u03b4', 'chemical shift'],
    width: 84,
  },
  {
    field: 'lineWidth',
    label: 'Line width',
    unit: 'Hz',
    kind: 'number',
    step: 0.1,
    aliases: ['width', 'lw'],
    width: 76,
  },
  { field: 't1', label: 'T1', unit: 's', kind: 'number', step: 0.1, width: 60 },
  { field: 't2', label: 'T2', unit: 's', kind: 'number', step: 0.1, width: 60 },
];

export const COUPLING_COLUMNS: readonly Column[] = [
  { field: 'between.0', label: 'From', kind: 'text', aliases: ['a', 'nucleus a', 'first'], width: 84 },
  { field: 'between.1', label: 'To', kind: 'text', aliases: ['b', 'nucleus b', 'second'], width: 84 },
  {
    field: 'j',
    label: 'J',
    unit: 'Hz',
    kind: 'number',
    step: 0.1,
    blank: '0',
    aliases: ['coupling', 'scalar'],
    width: 84,
  },
];

export const TENSOR_COLUMNS: readonly Column[] = [
  { field: 'csa.span', label: 'Span', unit: 'ppm', kind: 'number', step: 1 },
  { field: 'csa.skew', label: 'Skew', kind: 'number', step: 0.05 },
  { field: 'csa.euler.0', label: 'a', unit: '\u00b0', kind: 'number', step: 1 },
  { field: 'csa.euler.1', label: 'b', unit: '\u00b0', kind: 'number', step: 1 },
  { field: 'csa.euler.2', label: 'g', unit: '\u00b0', kind: 'number', step: 1 },
];

export const QUADRUPOLE_COLUMNS: readonly Column[] = [
  { field: 'quadrupole.cq', label: 'CQ', unit: 'Hz', kind: 'number', step: 1000 },
  { field: 'quadrupole.eta', label: 'eta', kind: 'number', step: 0.05 },
  { field: 'quadrupole.euler.0', label: 'a', unit: '\u00b0', kind: 'number', step: 1 },
  { field: 'quadrupole.euler.1', label: 'b', unit: '\u00b0', kind: 'number', step: 1 },
  { field: 'quadrupole.euler.2', label: 'g', unit: '\u00b0', kind: 'number', step: 1 },
];

export const POSITION_COLUMNS: readonly Column[] = [
  { field: 'position.0', label: 'x', unit: '\u00c5', kind: 'number', step: 0.1 },
  { field: 'position.1', label: 'y', unit: '\u00c5', kind: 'number', step: 0.1 },
  { field: 'position.2', label: 'z', unit: '\u00c5', kind: 'number', step: 0.1 },
];

/** `dipolar` holds the word 'positions' or the constant in Hz; the two angles belong to a constant. */
export const DIPOLAR_COLUMNS: readonly Column[] = [
  { field: 'between.0', label: 'From', kind: 'text' },
  { field: 'between.1', label: 'To', kind: 'text' },
  { field: 'dipolar', label: 'Dipolar', unit: "Hz, or 'positions'", kind: 'text' },
  { field: 'polar.0', label: 'theta', unit: '\u00b0', kind: 'number', step: 1 },
  { field: 'polar.1', label: 'phi', unit: '\u00b0', kind: 'number', step: 1 },
];

export const EXCHANGE_COLUMNS: readonly Column[] = [
  { field: 'from', label: 'From', kind: 'text' },
  { field: 'to', label: 'To', kind: 'text' },
  { field: 'rate', label: 'Rate', unit: 's\u207b\u00b9', kind: 'number', step: 10 },
  { field: 'eyring.enthalpy', label: 'Enthalpy', unit: 'kJ/mol', kind: 'number', step: 0.5 },
  { field: 'eyring.entropy', label: 'Entropy', unit: 'J/(mol K)', kind: 'number', step: 1 },
];

const TEXT_FIELDS = new Set(['id', 'isotope', 'between.0', 'between.1', 'dipolar', 'from', 'to']);

export function isNumberField(field: string): boolean {
  return !TEXT_FIELDS.has(field);
}

/** The keys inside a row that `field` names: 'csa.euler.0' is ['csa', 'euler', 0]. */
export function fieldKeys(field: string): PropertyKey[] {
  return field.split('.').map((part) => (/^\d+$/.test(part) ? Number(part) : part));
}

/** The path that the document checker uses for a cell. */
export function cellPath(table: TableName, row: number, field: string): string {
  return formatPath([table, row, ...fieldKeys(field)]);
}

export function headed(column: Column): string {
  return column.unit ? `${column.label} (${column.unit})` : column.label;
}
