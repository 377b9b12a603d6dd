import { Button, Tabs, TextInput, Textarea, Text } from '@mantine/core';
import { useState } from 'react';
import type { Experiment } from '@heddle/shared';
import { TensorPanel } from '../tensors/TensorPanel';
import { RatesPanel } from '../rates/RatesPanel';
import { GeometryImport } from '../geometry/GeometryImport';
import { notifyDone } from '../../lib/forms';
import { Grid } from './Grid';
import { cellKey } from './logic/check';
import { isBlankRow, type Draft, type Row } from './logic/draft';
import { withGeometry } from './logic/geometry';
import { addRow, followRename, moveRow, removeRow, setCell, setField } from './logic/edit';
import {
  COUPLING_COLUMNS,
  DIPOLAR_COLUMNS,
  EXCHANGE_COLUMNS,
  NUCLEUS_COLUMNS,
  POSITION_COLUMNS,
  QUADRUPOLE_COLUMNS,
  TENSOR_COLUMNS,
  type Column,
  type TableName,
} from './logic/fields';
import { pasteBlock } from './logic/paste';
import type { DraftState } from './useDraft';
import classes from './Bench.module.css';

const NAME: Column = { field: 'id', label: 'Nucleus', kind: 'text', width: 84 };
const STATE_COLUMNS: readonly Column[] = [
  { field: 'id', label: 'State', kind: 'text', width: 84 },
  { field: 'population', label: 'Population', kind: 'number', step: 0.05, width: 90 },
];

/** A row added by typing begins with these. */
const DEFAULTS: Record<TableName, Record<string, string>> = {
  nuclei: { isotope: '1H' },
  couplings: {},
  states: {},
  exchange: {},
};

interface SheetProps {
  state: DraftState;
  table: TableName;
  label: string;
  columns: readonly Column[];
  /** Rows can't be added or removed here, since another sheet of the same table does that. */
  fixed?: boolean;
  selected?: string | null;
  onSelect?(id: string | null): void;
}

/** One table of the system, typed into like a spreadsheet. */
function Sheet({ state, table, label, columns, fixed = false, selected, onSelect }: SheetProps) {
  const { draft, checked, edit } = state;
  const rows = draft[table];
  const onEdit = (row: Row | null, column: Column, text: string) => {
    const tag = `${table}/${row?.key ?? 'new'}/${column.field}`;
    edit(
      (now) =>
        row
          ? setCell(now, table, row.key, column.field, text)
          : addRow(now, table, { ...DEFAULTS[table], [column.field]: text }),
      tag,
    );
  };
  const tableError = checked.errors.tables.get(table);
  return (
    <>
      <Grid
        label={label}
        columns={columns}
        rows={rows}
        open={!fixed}
        nameOf={(row) => nameOf(table, row)}
        errorOf={(row, column) =>
          isBlankRow(row) ? undefined : checked.errors.cells.get(cellKey(table, row.key, column.field))
        }
        onEdit={onEdit}
        onCommit={(_, column, before, after) => {
          if (column.field === 'id' && (table === 'nuclei' || table === 'states')) {
            edit((now) => followRename(now, table, before, after), `${table}/rename`);
          }
        }}
        onPaste={(at, text) => {
          const { draft: next, rows: count } = pasteBlock(draft, table, columns, at, text, DEFAULTS[table]);
          edit(() => next);
          if (count > 1) notifyDone(`${count} rows pasted.`);
        }}
        onRemove={fixed ? undefined : (row) => edit((now) => removeRow(now, table, row.key))}
        onMove={fixed ? undefined : (row, by) => edit((now) => moveRow(now, table, row.key, by))}
        locked={fixed ? (_, column) => column === NAME || column.field.startsWith('between.') : undefined}
        selected={selected === undefined ? undefined : (rows.find((row) => row.cells.id === selected)?.key ?? null)}
        onSelect={onSelect && ((row) => onSelect(row?.cells.id ?? null))}
      />
      {tableError && (
        <Text size="sm" c="var(--madder)" mt={4} role="alert">
          {tableError}
        </Text>
      )}
    </>
  );
}

function nameOf(table: TableName, { cells }: Row): string {
  if (table === 'couplings') return `${cells['between.0'] ?? '?'} to ${cells['between.1'] ?? '?'}`;
  if (table === 'exchange') return `${cells.from ?? '?'} to ${cells.to ?? '?'}`;
  return cells.id ?? '';
}

/** Shifts and couplings that a state changes, one column for each nucleus and pair. */
function stateColumns(state: DraftState): Column[] {
  const { nuclei, couplings } = state.draft;
  const ids = nuclei.flatMap(({ cells }) => (cells.id ? [cells.id] : []));
  const pairs = couplings.flatMap(({ cells }) =>
    cells['between.0'] && cells['between.1'] ? [`${cells['between.0']},${cells['between.1']}`] : [],
  );
  return [
    ...STATE_COLUMNS,
    ...ids.map((id): Column => ({
      field: `shifts.${id}`,
      label: id,
      unit: 'ppm',
      kind: 'number',
      step: 0.01,
      width: 76,
    })),
    ...pairs.map((pair): Column => ({
      field: `j.${pair}`,
      label: `J ${pair.replace(',', '\u2013')}`,
      unit: 'Hz',
      kind: 'number',
      step: 0.1,
      width: 84,
    })),
  ];
}

/** The facts of the system as tables: they and the weave always agree. */
export function Tables({
  state,
  selected,
  onSelect,
  experiment,
}: {
  state: DraftState;
  selected: string | null;
  onSelect(id: string | null): void;
  /** For numbers that depend on the field. */
  experiment: Experiment | null;
}) {
  const { draft, checked, edit } = state;
  const [importing, setImporting] = useState(false);
  const problems = (tables: TableName[], fields: RegExp) =>
    [...checked.errors.cells.keys()].filter(
      (key) => tables.includes(key.split('/')[0] as TableName) && fields.test(key),
    ).length;
  const tensorErrors = problems(['nuclei'], /csa|quadrupole/);
  const placeErrors = problems(['nuclei', 'couplings'], /position|dipolar|polar/);
  const exchangeErrors = problems(['states', 'exchange'], /./);
  return (
    <>
      {importing && (
        <GeometryImport
          onClose={() => setImporting(false)}
          onUse={(found) => {
            edit((now) => withGeometry(now, found));
            setImporting(false);
            notifyDone(`${found.nuclei.length} nuclei are in the tables. Their shifts are still 0.`);
          }}
        />
      )}
      <Tabs defaultValue="nuclei" keepMounted={false} className={classes.tables}>
        <Tabs.List aria-label="Tables of the system">
          <Tabs.Tab value="nuclei">Nuclei and couplings</Tabs.Tab>
          <Tabs.Tab value="tensors">Tensors{tensorErrors > 0 && ` (${tensorErrors} to mend)`}</Tabs.Tab>
          <Tabs.Tab value="positions">Positions{placeErrors > 0 && ` (${placeErrors} to mend)`}</Tabs.Tab>
          <Tabs.Tab value="exchange">Exchange{exchangeErrors > 0 && ` (${exchangeErrors} to mend)`}</Tabs.Tab>
          <Tabs.Tab value="rates">Relaxation</Tabs.Tab>
          <Tabs.Tab value="notes">Notes</Tabs.Tab>
        </Tabs.List>
        <Tabs.Panel value="nuclei" className={classes.sheets}>
          <div>
            <Sheet
              state={state}
              table="nuclei"
              label="Nuclei"
              columns={NUCLEUS_COLUMNS}
              selected={selected}
              onSelect={onSelect}
            />
          </div>
          <div>
            <Sheet state={state} table="couplings" label="Couplings" columns={COUPLING_COLUMNS} />
          </div>
        </Tabs.Panel>
        <Tabs.Panel value="tensors" className={classes.sheets}>
          <div>
            <h3 className={classes.sheetTitle}>Shift tensors</h3>
            <Sheet state={state} table="nuclei" label="Shift tensors" columns={[NAME, ...TENSOR_COLUMNS]} fixed />
          </div>
          <div>
            <h3 className={classes.sheetTitle}>Quadrupolar couplings</h3>
            <Sheet
              state={state}
              table="nuclei"
              label="Quadrupolar couplings"
              columns={[NAME, ...QUADRUPOLE_COLUMNS]}
              fixed
            />
          </div>
          <div className={classes.whole}>
            <TensorPanel
              system={checked.system}
              onShift={(id, { span, skew, iso }) =>
                edit((now) => {
                  const row = now.nuclei.find(({ cells }) => cells.id?.trim() === id);
                  if (!row) return now;
                  const put = (draft: Draft, field: string, value: number) =>
                    setCell(draft, 'nuclei', row.key, field, String(+value.toPrecision(10)));
                  const turned = put(put(now, 'csa.span', span), 'csa.skew', skew);
                  return iso === undefined ? turned : put(turned, 'shift', iso);
                })
              }
            />
          </div>
        </Tabs.Panel>
        <Tabs.Panel value="positions" className={classes.sheets}>
          <div>
            <h3 className={classes.sheetTitle}>
              Positions{' '}
              <Button size="compact-xs" variant="default" onClick={() => setImporting(true)}>
                Geometry file ...
              </Button>
            </h3>
            <Sheet state={state} table="nuclei" label="Positions" columns={[NAME, ...POSITION_COLUMNS]} fixed />
          </div>
          <div>
            <h3 className={classes.sheetTitle}>Dipolar couplings</h3>
            <Sheet state={state} table="couplings" label="Dipolar couplings" columns={DIPOLAR_COLUMNS} />
          </div>
        </Tabs.Panel>
        <Tabs.Panel value="exchange" className={classes.sheets}>
          <div>
            <h3 className={classes.sheetTitle}>States</h3>
            <Sheet state={state} table="states" label="States" columns={stateColumns(state)} />
          </div>
          <div>
            <h3 className={classes.sheetTitle}>Exchange between them</h3>
            <Sheet state={state} table="exchange" label="Exchange" columns={EXCHANGE_COLUMNS} />
          </div>
        </Tabs.Panel>
        <Tabs.Panel value="rates" className={classes.rates}>
          <RatesPanel system={checked.system} experiment={experiment} />
        </Tabs.Panel>
        <Tabs.Panel value="notes" className={classes.notes}>
          <Textarea
            label="Notes"
            autosize
            minRows={3}
            value={draft.notes}
            onChange={({ currentTarget: { value } }) => edit((now) => setField(now, 'notes', value), 'notes')}
            error={checked.errors.fields.get('notes')}
          />
          <TextInput
            label="Correlation time of tumbling, s"
            description="Needed for relaxation from tumbling; 5e-11 is a small molecule in water."
            value={draft.tauC}
            onChange={({ currentTarget: { value } }) => edit((now) => setField(now, 'tauC', value), 'tauC')}
            error={checked.errors.fields.get('tauC')}
          />
        </Tabs.Panel>
      </Tabs>
    </>
  );
}
