import { useId, useRef, useState, type ClipboardEvent, type KeyboardEvent, type ReactNode } from 'react';
import { GridCell } from './GridCell';
import type { Row } from './logic/draft';
import type { Column } from './logic/fields';
import { moveInGrid, nextCell, type Place } from './logic/grid';
import { stepNumber } from './logic/numbers';
import { isBlock } from './logic/paste';
import classes from './Grid.module.css';

export interface GridProps {
  label: string;
  columns: readonly Column[];
  rows: readonly Row[];
  /** How a row is called: 'Ha', 'Ha to Hb'. */
  nameOf(row: Row): string;
  errorOf(row: Row, column: Column): string | undefined;
  /** Every keystroke. `row` is null for the open row at the end, which becomes a row by being typed in. */
  onEdit(row: Row | null, column: Column, text: string): void;
  /** The edit of a cell ends; `before` is what it held when the edit began. */
  onCommit?(row: Row, column: Column, before: string, after: string): void;
  onPaste?(at: Place, text: string): void;
  onRemove?(row: Row): void;
  onMove?(row: Row, by: -1 | 1): void;
  /** Whether an open row stands at the end. */
  open?: boolean;
  /** What an empty cell shows; the column's own `blank` by default. */
  blankOf?(row: Row, column: Column): string | undefined;
  /** What a cell shows in place of its text while it is not edited. */
  show?(text: string, column: Column): ReactNode;
  /** What stands before the cells of a row. */
  header?(row: Row): ReactNode;
  /** Cells that can't be typed in. */
  locked?(row: Row, column: Column): boolean;
  readOnly?: boolean;
  selected?: string | null;
  onSelect?(row: Row | null): void;
}

interface Edit extends Place {
  readonly before: string;
  readonly text: string;
}

/**
 * A table of cells to type in, as a spreadsheet is used (WAI-ARIA grid pattern): one tab stop; arrows, Home, End and
 * Page keys move; typing, Enter or F2 edit; Enter and Tab take the value, Escape gives the old one back; up and down
 * step a number while it is edited, with Alt also without. Alt+Shift with up or down moves a row, Ctrl+Delete removes it.
 */
export function Grid(props: GridProps) {
  const {
    label,
    columns,
    rows,
    onEdit,
    onCommit,
    onPaste,
    onRemove,
    onMove,
    open = true,
    readOnly = false,
    onSelect,
  } = props;
  const id = useId();
  const table = useRef<HTMLTableElement>(null);
  const [at, setAt] = useState<Place>({ row: 0, column: 0 });
  const [edit, setEdit] = useState<Edit | null>(null);
  const removable = onRemove !== undefined && !readOnly;
  const count = rows.length + (open && !readOnly ? 1 : 0);
  const width = columns.length + (removable ? 1 : 0);
  const here: Place = { row: Math.min(at.row, Math.max(count - 1, 0)), column: Math.min(at.column, width - 1) };

  const textAt = ({ row, column }: Place) => rows[row]?.cells[columns[column].field] ?? '';
  const isLocked = ({ row, column }: Place) =>
    rows[row] !== undefined && (props.locked?.(rows[row], columns[column]) ?? false);
  const arrive = (place: Place) => {
    setAt(place);
    onSelect?.(rows[place.row] ?? null);
  };
  const focus = (place: Place) => {
    arrive(place);
    const find = () => table.current?.querySelector<HTMLElement>(`[data-place="${placeName(id, place)}"]`);
    // At once where the cell is there, so that fast keys find it; a cell that the edit has yet to make is drawn first.
    const cell = find();
    if (cell) cell.focus();
    else requestAnimationFrame(() => find()?.focus());
  };
  const begin = (place: Place, text = textAt(place)) => {
    if (readOnly || isLocked(place)) return;
    arrive(place);
    setEdit({ ...place, before: textAt(place), text });
    if (text !== textAt(place)) onEdit(rows[place.row] ?? null, columns[place.column], text);
  };
  const type = (text: string) => {
    if (!edit) return;
    setEdit({ ...edit, text });
    onEdit(rows[edit.row] ?? null, columns[edit.column], text);
  };
  const end = (keep: boolean) => {
    const row = edit && rows[edit.row];
    setEdit(null);
    if (!edit || !row) return;
    if (!keep) onEdit(row, columns[edit.column], edit.before);
    else if (edit.text !== edit.before) onCommit?.(row, columns[edit.column], edit.before, edit.text);
  };
  const replace = (place: Place, text: string) => {
    const row = rows[place.row];
    const before = textAt(place);
    if (!row || readOnly || text === before || isLocked(place)) return;
    onEdit(row, columns[place.column], text);
    onCommit?.(row, columns[place.column], before, text);
  };
  const move = (place: Place, by: -1 | 1) => {
    if (!rows[place.row] || !rows[place.row + by] || readOnly) return;
    onMove?.(rows[place.row], by);
    focus({ ...place, row: place.row + by });
  };
  const remove = (place: Place) => {
    if (!rows[place.row] || !removable) return;
    onRemove(rows[place.row]);
    focus({ row: Math.max(Math.min(place.row, count - 2), 0), column: place.column });
  };

  const onCellKey = (event: KeyboardEvent, place: Place) => {
    const { key, altKey, shiftKey } = event;
    const ctrl = event.ctrlKey || event.metaKey;
    const column = columns[place.column] as Column | undefined;
    const vertical = key === 'ArrowUp' ? -1 : key === 'ArrowDown' ? 1 : null;
    const rubout = key === 'Delete' || key === 'Backspace';
    const act = (): boolean => {
      if (altKey && vertical !== null) {
        if (shiftKey) move(place, vertical);
        else if (column?.step) replace(place, stepNumber(textAt(place), -vertical * column.step));
      } else if (ctrl && rubout) remove(place);
      else if (column && (key === 'Enter' || key === 'F2')) begin(place);
      else if (column && rubout) replace(place, '');
      else if (column && key.length === 1 && !ctrl && !altKey) begin(place, key);
      else {
        const to = altKey ? null : moveInGrid({ key, ctrl }, place, count, width);
        if (to) focus(to);
        return to !== null;
      }
      return true;
    };
    if (act()) event.preventDefault();
  };

  const onInputKey = (event: KeyboardEvent<HTMLInputElement>) => {
    if (!edit) return;
    const { key, shiftKey } = event;
    const step = columns[edit.column].step;
    if (key === 'Escape') {
      event.preventDefault();
      end(false);
      focus(edit);
    } else if (key === 'Enter') {
      event.preventDefault();
      end(true);
      focus({ row: Math.max(edit.row + (shiftKey ? -1 : 1), 0), column: edit.column });
    } else if (key === 'Tab') {
      const next = nextCell(edit, Math.max(count, edit.row + 1), columns.length, shiftKey ? -1 : 1);
      if (next) event.preventDefault();
      end(true);
      if (next) focus(next);
    } else if ((key === 'ArrowUp' || key === 'ArrowDown') && step) {
      event.preventDefault();
      type(stepNumber(edit.text, step * (shiftKey ? 10 : 1) * (key === 'ArrowUp' ? 1 : -1)));
    }
  };

  const paste = (event: ClipboardEvent, place: Place) => {
    const text = event.clipboardData.getData('text/plain');
    if (readOnly || !onPaste || (edit && !isBlock(text))) return;
    event.preventDefault();
    setEdit(null);
    onPaste(place, text);
    focus(place);
  };

  return (
    <div className={classes.frame}>
      <table ref={table} className={classes.grid} role="grid" aria-label={label} aria-readonly={readOnly || undefined}>
        <thead>
          <tr>
            {props.header && <td />}
            {columns.map((column) => (
              <th
                key={column.field}
                scope="col"
                className={column.kind === 'number' ? classes.number : undefined}
                style={{ minWidth: column.width }}
              >
                {column.label}
                {column.unit && <span className={classes.unit}> {column.unit}</span>}
              </th>
            ))}
            {removable && (
              <th scope="col" className={classes.action}>
                <span className={classes.hidden}>Remove</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {Array.from({ length: count }, (_, rowIndex) => {
            const row = rows[rowIndex] as Row | undefined;
            const rowName = row ? props.nameOf(row) || `row ${rowIndex + 1}` : 'new row';
            return (
              // Rows are drawn by place, so that the open row stays the same element when typing turns it into a row.
              <tr
                key={rowIndex}
                className={row ? undefined : classes.open}
                data-selected={(row && row.key === props.selected) || undefined}
              >
                {props.header && <th scope="row">{row && props.header(row)}</th>}
                {columns.map((column, columnIndex) => {
                  const place = { row: rowIndex, column: columnIndex };
                  const text = textAt(place);
                  return (
                    <GridCell
                      key={column.field}
                      column={column}
                      rowName={rowName}
                      place={placeName(id, place)}
                      text={text}
                      shown={props.show?.(text, column) ?? text}
                      blank={row && (props.blankOf ? props.blankOf(row, column) : column.blank)}
                      error={row && props.errorOf(row, column)}
                      typed={samePlace(edit, place) ? edit!.text : null}
                      tabStop={samePlace(here, place)}
                      onFocus={() => arrive(place)}
                      onBegin={() => begin(place)}
                      onType={type}
                      onEnd={() => end(true)}
                      onCellKey={(event) => onCellKey(event, place)}
                      onInputKey={onInputKey}
                      onPaste={(event) => paste(event, place)}
                    />
                  );
                })}
                {removable && (
                  <td className={classes.action} role="gridcell">
                    {row && (
                      <button
                        type="button"
                        data-place={placeName(id, { row: rowIndex, column: columns.length })}
                        tabIndex={samePlace(here, { row: rowIndex, column: columns.length }) ? 0 : -1}
                        aria-label={`Remove ${rowName}`}
                        onFocus={() => arrive({ row: rowIndex, column: columns.length })}
                        onKeyDown={(event) => onCellKey(event, { row: rowIndex, column: columns.length })}
                        onClick={() => remove({ row: rowIndex, column: columns.length })}
                      >
                        {'\u00d7'}
                      </button>
                    )}
                  </td>
                )}
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

function placeName(grid: string, { row, column }: Place): string {
  return `${grid}${row}-${column}`;
}

function samePlace(a: Place | null, b: Place): boolean {
  return a !== null && a.row === b.row && a.column === b.column;
}
