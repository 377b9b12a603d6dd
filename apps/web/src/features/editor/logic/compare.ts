import type { SpinSystemInput } from '@heddle/shared';

/** One thing in which two versions of a system differ: a value, or a whole row that one of them lacks. */
export interface Difference {
  readonly id: string;
  readonly label: string;
  readonly theirs: string;
  readonly mine: string;
}

type Json = string | number | boolean | null | Json[] | { [key: string]: Json };
type Part = { label: string; value: Json };

/** Every value of a document under a name that does not depend on the order of its rows. */
function parts(document: SpinSystemInput): Map<string, Part> {
  const out = new Map<string, Part>();
  const put = (id: string, label: string, value: unknown) => {
    if (value !== undefined) out.set(id, { label, value: value as Json });
  };
  put('name', 'name', document.name);
  put('notes', 'notes', document.notes);
  put('tumbling', 'correlation time', document.tumbling);
  for (const { id, ...rest } of document.nuclei) putRow(`nuclei/${id}`, `nucleus ${id}`, rest, put);
  for (const { between, ...rest } of document.couplings ?? []) {
    putRow(`couplings/${[...between].sort().join(',')}`, `coupling ${between.join('\u2013')}`, rest, put);
  }
  for (const { id, ...rest } of document.states ?? []) putRow(`states/${id}`, `state ${id}`, rest, put);
  for (const { from, to, ...rest } of document.exchange ?? [])
    putRow(`exchange/${from},${to}`, `exchange ${from} to ${to}`, rest, put);
  return out;
}

function putRow(
  id: string,
  label: string,
  rest: object,
  put: (id: string, label: string, value: unknown) => void,
): void {
  put(id, label, true);
  for (const [key, value] of Object.entries(rest) as [string, unknown][])
    put(`${id}/${key}`, `${label}, ${key}`, value);
}

function words(part: Part | undefined): string {
  if (!part) return 'not there';
  if (part.value === true) return 'there';
  return typeof part.value === 'string'
    ? part.value
    : JSON.stringify(part.value).replaceAll('"', '').replaceAll(',', ', ');
}

/** In what two versions differ. A row that only one has is one difference, not one for each of its cells. */
export function compareDocuments(theirs: SpinSystemInput, mine: SpinSystemInput): Difference[] {
  const [a, b] = [parts(theirs), parts(mine)];
  const differences: Difference[] = [];
  for (const id of new Set([...a.keys(), ...b.keys()])) {
    const [x, y] = [a.get(id), b.get(id)];
    if (JSON.stringify(x?.value) === JSON.stringify(y?.value)) continue;
    const row = id.split('/').slice(0, 2).join('/');
    if (row !== id && a.has(row) !== b.has(row)) continue;
    differences.push({ id, label: (x ?? y)!.label, theirs: words(x), mine: words(y) });
  }
  return differences;
}

/** The version that takes mine for the chosen differences and theirs for all others. Rows keep their order. */
export function mergeDocuments(
  theirs: SpinSystemInput,
  mine: SpinSystemInput,
  takeMine: ReadonlySet<string>,
): SpinSystemInput {
  const scalar = <K extends 'name' | 'notes' | 'tumbling'>(key: K) => (takeMine.has(key) ? mine[key] : theirs[key]);
  const rows = <T extends object>(
    table: string,
    a: readonly T[] = [],
    b: readonly T[] = [],
    name: (row: T) => string,
  ): T[] => {
    const other = new Map(b.map((row) => [name(row), row]));
    const own = new Set(a.map(name));
    const kept = a.flatMap((row) => {
      const id = `${table}/${name(row)}`;
      const twin = other.get(name(row));
      if (!twin) return takeMine.has(id) ? [] : [row];
      return [mergeRow(row, twin, id, takeMine)];
    });
    return [...kept, ...b.filter((row) => !own.has(name(row)) && takeMine.has(`${table}/${name(row)}`))];
  };
  const merged: SpinSystemInput = {
    format: 'heddle.spin-system/1',
    name: scalar('name'),
    notes: scalar('notes'),
    nuclei: rows('nuclei', theirs.nuclei, mine.nuclei, (row) => row.id),
    couplings: rows('couplings', theirs.couplings, mine.couplings, (row) => [...row.between].sort().join(',')),
    states: rows('states', theirs.states, mine.states, (row) => row.id),
    exchange: rows('exchange', theirs.exchange, mine.exchange, (row) => `${row.from},${row.to}`),
    tumbling: scalar('tumbling'),
  };
  if (merged.states?.length === 0) delete merged.states;
  if (merged.exchange?.length === 0) delete merged.exchange;
  return JSON.parse(JSON.stringify(merged)) as SpinSystemInput;
}

function mergeRow<T extends object>(theirs: T, mine: T, id: string, takeMine: ReadonlySet<string>): T {
  const chosen = Object.keys({ ...theirs, ...mine }).filter((key) => takeMine.has(`${id}/${key}`)) as (keyof T)[];
  return { ...theirs, ...Object.fromEntries(chosen.map((key) => [key, mine[key]])) };
}
