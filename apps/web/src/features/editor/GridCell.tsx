import { Tooltip } from '@mantine/core';
import { useRef, type ClipboardEvent, type KeyboardEvent, type ReactNode } from 'react';
import { headed, type Column } from './logic/fields';
import classes from './Grid.module.css';

export interface GridCellProps {
  column: Column;
  /** The row in words, for a screen reader. */
  rowName: string;
  place: string;
  text: string;
  blank?: string;
  error?: string;
  shown: ReactNode;
  /** The text being typed, when this cell is edited. */
  typed: string | null;
  tabStop: boolean;
  onFocus(): void;
  onBegin(): void;
  onType(text: string): void;
  onEnd(): void;
  onCellKey(event: KeyboardEvent): void;
  onInputKey(event: KeyboardEvent<HTMLInputElement>): void;
  onPaste(event: ClipboardEvent): void;
}

/** One cell: its text, or while it is edited an input with the same name. A click on the focused cell edits it. */
export function GridCell(props: GridCellProps) {
  const { column, rowName, place, text, blank, error, typed, tabStop } = props;
  const wasFocused = useRef(false);
  const name = `${headed(column)}, ${rowName}`;
  const errorId = error ? `${place}-error` : undefined;
  return (
    <td
      role="gridcell"
      data-place={place}
      tabIndex={typed === null && tabStop ? 0 : -1}
      className={column.kind === 'number' ? classes.number : undefined}
      data-error={error ? true : undefined}
      aria-invalid={error ? true : undefined}
      aria-describedby={errorId}
      aria-label={`${name}: ${text || blank || 'empty'}`}
      onFocus={(event) => {
        if (event.target === event.currentTarget) props.onFocus();
      }}
      onMouseDown={(event) => {
        wasFocused.current = document.activeElement === event.currentTarget;
      }}
      onClick={() => {
        if (typed === null && wasFocused.current) props.onBegin();
      }}
      onDoubleClick={() => {
        if (typed === null) props.onBegin();
      }}
      onKeyDown={(event) => {
        if (typed === null) props.onCellKey(event);
      }}
      onPaste={props.onPaste}
      onCopy={(event) => {
        if (typed !== null) return;
        event.preventDefault();
        event.clipboardData.setData('text/plain', text);
      }}
    >
      {typed === null ? (
        <Tooltip label={error} disabled={!error} openDelay={200}>
          <span className={classes.text}>
            {text === '' ? <span className={classes.blank}>{blank}</span> : props.shown}
          </span>
        </Tooltip>
      ) : (
        <input
          autoFocus
          aria-label={name}
          aria-invalid={error ? true : undefined}
          aria-describedby={errorId}
          inputMode={column.kind === 'number' ? 'decimal' : 'text'}
          spellCheck={false}
          autoComplete="off"
          value={typed}
          onFocus={(event) => event.currentTarget.setSelectionRange(typed.length, typed.length)}
          onChange={(event) => props.onType(event.currentTarget.value)}
          onKeyDown={props.onInputKey}
          onBlur={props.onEnd}
        />
      )}
      {error && (
        <span id={errorId} className={classes.hidden}>
          {error}
        </span>
      )}
    </td>
  );
}
