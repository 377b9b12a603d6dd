import type { SpinSystemInput } from '@heddle/shared';
import { cellPath, fieldKeys, isNumberField, TABLES, type TableName } from './fields';
import { readNumber, writeNumber } from './numbers';

/** A row of a table while it is edited: the text of its cells as typed, by field. Blank cells have no entry. */
export interface Row {
  readonly key: string;
  readonly cells: Readonly<Record<string, string>>;
}

/**
 * A spin system while it is edited. Cells hold text, so that what can't be read yet is neither lost nor changed;
 * `toDocument` makes the document that the schema checks.
 */
export interface Draft {
  readonly name: string;
  readonly notes: string;
  readonly tauC: string;
  readonly nuclei: readonly Row[];
  readonly couplings: readonly Row[];
  readonly states: readonly Row[];
  readonly exchange: readonly Row[];
}

export const EMPTY_DRAFT: Draft = {
  name: '',
  notes: '',
  tauC: '',
  nuclei: [],
  couplings: [],
  states: [],
  exchange: [],
};

let lastKey = 0;

/** A row key that no other row of this page has, drafts restored from an earlier visit included. */
export function newKey(): string {
  lastKey += 1;
  return `${Date.now().toString(36)}-${lastKey}`;
}

export function newRow(cells: Record<string, string>): Row {
  return { key: newKey(), cells };
}

export function isBlankRow(row: Row): boolean {
  return Object.values(row.cells).every((text) => text.trim() === '');
}

/** The draft that shows `document`. */
export function fromDocument(document: SpinSystemInput): Draft {
  return {
    name: document.name,
    notes: document.notes ?? '',
    tauC: document.tumbling ? writeNumber(document.tumbling.tauC) : '',
    nuclei: document.nuclei.map((nucleus) => newRow(flatten(nucleus))),
    couplings: (document.couplings ?? []).map(({ dipolar, ...coupling }) =>
      newRow({ ...flatten(coupling), ...flattenDipolar(dipolar) }),
    ),
    states: (document.states ?? []).map((state) => newRow(flatten(state))),
    exchange: (document.exchange ?? []).map((step) => newRow(flatten(step))),
  };
}

type DipolarInput = NonNullable<SpinSystemInput['couplings']>[number]['dipolar'];

function flattenDipolar(dipolar: DipolarInput): Record<string, string> {
  if (dipolar === undefined) return {};
  if (dipolar === 'positions') return { dipolar };
  const [theta, phi] = dipolar.polar ?? [0, 0];
  return { dipolar: writeNumber(dipolar.constant), 'polar.0': writeNumber(theta), 'polar.1': writeNumber(phi) };
}

/** The leaves of a document's row as cells. */
function flatten(value: object, prefix = ''): Record<string, string> {
  const cells: Record<string, string> = {};
  for (const [key, inner] of Object.entries(value) as [string, unknown][]) {
    if (typeof inner === 'object' && inner !== null) Object.assign(cells, flatten(inner, `${prefix}${key}.`));
    else if (typeof inner === 'number') cells[prefix + key] = writeNumber(inner);
    else if (typeof inner === 'string') cells[prefix + key] = inner;
  }
  return cells;
}

export interface DraftDocument {
  /** What the schema is asked to check; not yet known to be a spin system. */
  readonly document: Record<string, unknown>;
  /** What could not even be read, by document path. */
  readonly unread: ReadonlyMap<string, string>;
  /** For each table, the row of the draft behind each row of the document: wholly blank rows are left out of it. */
  readonly rows: Readonly<Record<TableName, readonly number[]>>;
}

/** The document that the draft says, with the text itself where a number can't be read. */
export function toDocument(draft: Draft): DraftDocument {
  const unread = new Map<string, string>();
  const kept = (table: TableName) => draft[table].flatMap((row, i) => (isBlankRow(row) ? [] : [i]));
  const rows = Object.fromEntries(TABLES.map((table) => [table, kept(table)])) as Record<TableName, number[]>;
  const read = (table: TableName) =>
    rows[table].map((i, position) => readRow(draft[table][i], table, position, unread));

  const document: Record<string, unknown> = { format: 'heddle.spin-system/1', name: draft.name.trim() };
  if (draft.notes.trim() !== '') document.notes = draft.notes;
  document.nuclei = read('nuclei');
  document.couplings = read('couplings');
  if (rows.states.length > 0) document.states = read('states');
  if (rows.exchange.length > 0) document.exchange = read('exchange');
  if (draft.tauC.trim() !== '') {
    document.tumbling = { tauC: readCell(draft.tauC, true, (message) => unread.set('tumbling.tauC', message)) };
  }
  return { document, unread, rows };
}

const TUPLES: Readonly<Record<string, { length: number; blank?: number }>> = {
  euler: { length: 3, blank: 0 },
  polar: { length: 2, blank: 0 },
  position: { length: 3 },
  between: { length: 2 },
};

function readRow(row: Row, table: TableName, position: number, unread: Map<string, string>): Record<string, unknown> {
  const out: Record<string, unknown> = {};
  if (table === 'couplings') out.between = ['', ''];
  for (const [field, text] of Object.entries(row.cells)) {
    if (text.trim() === '' || field === 'dipolar' || field.startsWith('polar.')) continue;
    const value = readCell(text, isNumberField(field), (message) =>
      unread.set(cellPath(table, position, field), message),
    );
    place(out, fieldKeys(field), value);
  }
  if (table === 'couplings') readDipolar(row, position, out, unread);
  return out;
}

function readCell(text: string, asNumber: boolean, refuse: (message: string) => void): unknown {
  if (!asNumber) return text.trim();
  const read = readNumber(text);
  if (read.ok) return read.value;
  refuse(read.message);
  return text;
}

/** A dipolar cell says 'positions', or a constant whose axis the two angles give. */
function readDipolar(row: Row, position: number, out: Record<string, unknown>, unread: Map<string, string>): void {
  const text = (row.cells.dipolar ?? '').trim();
  const angles = ['polar.0', 'polar.1'].map((field) => (row.cells[field] ?? '').trim());
  if (text === '' && angles.every((angle) => angle === '')) return;
  if (text === 'positions') {
    out.dipolar = text;
    return;
  }
  const base = `couplings[${position}].dipolar`;
  const constant =
    text === ''
      ? undefined
      : readCell(text, true, () => unread.set(`${base}.constant`, "a number of Hz, or the word 'positions'"));
  const polar = angles.map((angle, i) =>
    angle === '' ? 0 : readCell(angle, true, (message) => unread.set(`${base}.polar[${i}]`, message)),
  );
  out.dipolar = { constant, polar };
}

function place(target: Record<PropertyKey, unknown>, keys: readonly PropertyKey[], value: unknown): void {
  let here = target;
  keys.slice(0, -1).forEach((key) => {
    const tuple = TUPLES[String(key)];
    here[key] ??= tuple ? Array.from({ length: tuple.length }, () => tuple.blank) : {};
    here = here[key] as Record<PropertyKey, unknown>;
  });
  here[keys[keys.length - 1]] = value;
}
