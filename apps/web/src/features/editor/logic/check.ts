import { readSystem, type DocumentError, type SpinSystem } from '@heddle/shared';
import { toDocument, type Draft, type DraftDocument } from './draft';
import { TABLES, type TableName } from './fields';

/** What is wrong with a draft, by the place where it is shown. */
export interface DraftErrors {
  /** By `cellKey`. */
  readonly cells: ReadonlyMap<string, string>;
  /** By table: what concerns the table as a whole. */
  readonly tables: ReadonlyMap<TableName, string>;
  /** 'name', 'notes', 'tauC'. */
  readonly fields: ReadonlyMap<string, string>;
  /** Every error with the place in words, for the list beside the Save button. */
  readonly all: readonly { readonly place: string; readonly message: string }[];
}

export interface CheckedDraft {
  readonly document: Record<string, unknown>;
  /** The spin system, when nothing is wrong. */
  readonly system: SpinSystem | null;
  readonly errors: DraftErrors;
}

export function cellKey(table: TableName, rowKey: string, field: string): string {
  return `${table}/${rowKey}/${field}`;
}

/** Reads and checks a draft, and finds the cell of every error. */
export function checkDraft(draft: Draft): CheckedDraft {
  const read = toDocument(draft);
  const result = readSystem(read.document);
  return {
    document: read.document,
    system: result.ok ? result.value : null,
    errors: placeErrors(draft, read, result.ok ? [] : result.errors),
  };
}

/** Puts errors of the document (from the schema here, or from the server) at the cells of the draft. */
export function placeErrors(draft: Draft, read: DraftDocument, errors: readonly DocumentError[]): DraftErrors {
  const cells = new Map<string, string>();
  const tables = new Map<TableName, string>();
  const fields = new Map<string, string>();
  const all: { place: string; message: string }[] = [];

  for (const { path, message: raw } of errors) {
    const message = read.unread.get(path) ?? plainWords(raw);
    const table = TABLES.find((name) => path === name || path.startsWith(`${name}[`));
    const position = table ? Number(/\[(\d+)\]/.exec(path)?.[1] ?? NaN) : NaN;
    const index = table && Number.isInteger(position) ? read.rows[table][position] : undefined;
    if (table && index !== undefined) {
      const row = draft[table][index];
      const field = nearestField(table, position, path);
      const key = cellKey(table, row.key, field);
      if (!cells.has(key)) cells.set(key, message);
      all.push({ place: `${ROW_NAMES[table]} ${rowName(table, row.cells, index)}, ${fieldName(field)}`, message });
    } else if (table) {
      tables.set(
        table,
        table === 'nuclei' && draft.nuclei.length === 0 ? 'type or paste at least one nucleus' : message,
      );
      all.push({ place: table, message });
    } else {
      const field = path.startsWith('tumbling') ? 'tauC' : path;
      if (!fields.has(field))
        fields.set(field, field === 'name' && draft.name.trim() === '' ? 'a system needs a name' : message);
      all.push({ place: field === 'tauC' ? 'correlation time' : field, message: fields.get(field) ?? message });
    }
  }
  return { cells, tables, fields, all };
}

const ROW_NAMES: Record<TableName, string> = {
  nuclei: 'nucleus',
  couplings: 'coupling',
  states: 'state',
  exchange: 'exchange',
};

function rowName(table: TableName, cells: Readonly<Record<string, string>>, index: number): string {
  if (table === 'couplings') return `${cells['between.0'] || '?'}\u2013${cells['between.1'] || '?'}`;
  if (table === 'exchange') return `${cells.from || '?'} to ${cells.to || '?'}`;
  return cells.id || String(index + 1);
}

function fieldName(field: string): string {
  const names: Record<string, string> = {
    'between.0': 'first nucleus',
    'between.1': 'second nucleus',
    lineWidth: 'line width',
    t1: 'T1',
    t2: 'T2',
    j: 'J',
  };
  return (
    names[field] ??
    field.replace(/^(shifts|j)\./, '$1 of ').replace(/\.(\d)$/, (_, digit: string) => ` ${Number(digit) + 1}`)
  );
}

/** Field names a row can carry errors at, and where an error about a whole part of the row is shown. */
const PART_FIELDS: readonly [string, string][] = [
  ['csa', 'csa.span'],
  ['quadrupole', 'quadrupole.cq'],
  ['position', 'position.0'],
  ['between', 'between.1'],
  ['eyring', 'eyring.enthalpy'],
];

function nearestField(table: TableName, position: number, path: string): string {
  const rest = path
    .slice(`${table}[${position}]`.length)
    .replace(/^\./, '')
    .replace(/\["([^"]*)"\]/g, '.$1')
    .replace(/\[(\d+)\]/g, '.$1');
  if (rest === '') return table === 'exchange' ? 'to' : table === 'couplings' ? 'between.1' : 'id';
  if (table === 'couplings' && rest.startsWith('dipolar'))
    return rest.startsWith('dipolar.polar') ? rest.slice('dipolar.'.length) : 'dipolar';
  return PART_FIELDS.find(([part]) => part === rest)?.[1] ?? rest;
}

/** The checker's words for a missing or wrong value, as a person would say them. */
function plainWords(message: string): string {
  if (/received undefined$/.test(message)) return 'needs a value';
  const range = /^Too (small|big): expected (?:number|int) to be ([<>]=?)(-?[\d.e+]+)$/.exec(message);
  if (range) {
    const words: Record<string, string> = { '>': 'more than', '>=': 'at least', '<': 'less than', '<=': 'at most' };
    return `must be ${words[range[2]]} ${range[3]}`;
  }
  if (/expected int/.test(message)) return 'must be a whole number';
  return message;
}
