import { newRow, type Draft, type Row } from './draft';
import type { TableName } from './fields';

/** Every edit takes a draft and gives the draft after it; an edit that changes nothing gives the same object. */

export function setCell(draft: Draft, table: TableName, rowKey: string, field: string, text: string): Draft {
  return editRows(draft, table, (rows) =>
    mapChanged(rows, (row) =>
      row.key === rowKey && (row.cells[field] ?? '') !== text ? withCell(row, field, text) : row,
    ),
  );
}

export function setField(draft: Draft, field: 'name' | 'notes' | 'tauC', text: string): Draft {
  return draft[field] === text ? draft : { ...draft, [field]: text };
}

/** Adds a row at `index` (the end by default). */
export function addRow(
  draft: Draft,
  table: TableName,
  cells: Record<string, string>,
  index = draft[table].length,
): Draft {
  return editRows(draft, table, (rows) => [...rows.slice(0, index), newRow(cells), ...rows.slice(index)]);
}

export function moveRow(draft: Draft, table: TableName, rowKey: string, by: -1 | 1): Draft {
  const rows = draft[table];
  const from = rows.findIndex((row) => row.key === rowKey);
  const to = from + by;
  if (from < 0 || to < 0 || to >= rows.length) return draft;
  const moved = [...rows];
  [moved[from], moved[to]] = [moved[to], moved[from]];
  return { ...draft, [table]: moved };
}

/** Removes a row and what only made sense with it: the couplings and overrides of a nucleus, the exchange of a state. */
export function removeRow(draft: Draft, table: TableName, rowKey: string): Draft {
  const row = draft[table].find((candidate) => candidate.key === rowKey);
  if (!row) return draft;
  const rest = { ...draft, [table]: draft[table].filter((candidate) => candidate.key !== rowKey) };
  const id = (row.cells.id ?? '').trim();
  if (id === '' || rest[table].some((other) => other.cells.id?.trim() === id)) return rest;
  if (table === 'nuclei') {
    return {
      ...rest,
      couplings: rest.couplings.filter((coupling) => !ends(coupling, 'between.0', 'between.1').includes(id)),
      states: rest.states.map((state) => ({ ...state, cells: dropOverrides(state.cells, id) })),
    };
  }
  if (table === 'states')
    return { ...rest, exchange: rest.exchange.filter((step) => !ends(step, 'from', 'to').includes(id)) };
  return rest;
}

/** After the id of a nucleus or of a state was changed from `before`, everything that named it follows. */
export function followRename(draft: Draft, table: 'nuclei' | 'states', before: string, after: string): Draft {
  const [from, to] = [before.trim(), after.trim()];
  const taken = (id: string) => draft[table].filter((row) => row.cells.id?.trim() === id).length;
  if (from === '' || to === '' || from === to || taken(from) > 0 || taken(to) > 1) return draft;
  const swap = (text: string) => (text.trim() === from ? to : text);
  const renameCells = (rows: readonly Row[], fields: readonly string[]) =>
    mapChanged(rows, (row) =>
      fields.reduce((now, field) => (now.cells[field]?.trim() === from ? withCell(now, field, to) : now), row),
    );
  if (table === 'states') return { ...draft, exchange: renameCells(draft.exchange, ['from', 'to']) };
  return {
    ...draft,
    couplings: renameCells(draft.couplings, ['between.0', 'between.1']),
    states: draft.states.map((state) => ({
      ...state,
      cells: Object.fromEntries(
        Object.entries(state.cells).map(([field, text]) => [renameOverride(field, swap), text]),
      ),
    })),
  };
}

/** Sets J of a pair from the matrix view: changes the pair's row, adds one, or clears it. */
export function setPairJ(draft: Draft, a: string, b: string, text: string): Draft {
  const row = findPair(draft, a, b);
  if (row) return setCell(draft, 'couplings', row.key, 'j', text);
  return text.trim() === '' ? draft : addRow(draft, 'couplings', { 'between.0': a, 'between.1': b, j: text });
}

export function findPair(draft: Draft, a: string, b: string): Row | undefined {
  return draft.couplings.find((row) => {
    const [first, second] = ends(row, 'between.0', 'between.1');
    return (first === a && second === b) || (first === b && second === a);
  });
}

function ends(row: Row, a: string, b: string): string[] {
  return [row.cells[a]?.trim() ?? '', row.cells[b]?.trim() ?? ''];
}

function withCell(row: Row, field: string, text: string): Row {
  const cells = { ...row.cells };
  if (text === '') delete cells[field];
  else cells[field] = text;
  return { ...row, cells };
}

function dropOverrides(cells: Row['cells'], id: string): Row['cells'] {
  return Object.fromEntries(Object.entries(cells).filter(([field]) => !overrideIds(field).includes(id)));
}

/** The nuclei that an override of a state names: 'shifts.Ha' or 'j.Ha,Hb'. */
function overrideIds(field: string): string[] {
  const match = /^(shifts|j)\.(.+)$/.exec(field);
  return match ? match[2].split(',').map((id) => id.trim()) : [];
}

function renameOverride(field: string, swap: (id: string) => string): string {
  const ids = overrideIds(field);
  return ids.length === 0 ? field : `${field.slice(0, field.indexOf('.'))}.${ids.map(swap).join(',')}`;
}

function mapChanged(rows: readonly Row[], edit: (row: Row) => Row): readonly Row[] {
  const next = rows.map(edit);
  return next.every((row, i) => row === rows[i]) ? rows : next;
}

function editRows(draft: Draft, table: TableName, edit: (rows: readonly Row[]) => readonly Row[]): Draft {
  const rows = edit(draft[table]);
  return rows === draft[table] ? draft : { ...draft, [table]: rows };
}
