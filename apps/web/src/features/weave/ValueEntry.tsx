import { useState } from 'react';
import { TextInput } from '@mantine/core';
import classes from './Weave.module.css';

export type Entry =
  | { kind: 'shift'; id: string; x: number; y: number; value: number }
  | { kind: 'j'; a: string; b: string; x: number; y: number; value: number };

interface ValueEntryProps {
  entry: Entry;
  onCommit(value: number): void;
  onClose(): void;
}

/** A small field over the weave to type a shift or a coupling; Enter takes it, Escape leaves all as it was. */
export function ValueEntry({ entry, onCommit, onClose }: ValueEntryProps) {
  const [text, setText] = useState(String(entry.value));
  const value = text.trim() === '' ? NaN : Number(text);
  const label = entry.kind === 'shift' ? `Shift of ${entry.id}, ppm` : `J of ${entry.a} and ${entry.b}, Hz`;
  return (
    <form
      className={classes.entry}
      style={{ left: entry.x, top: entry.y }}
      onSubmit={(event) => {
        event.preventDefault();
        if (!Number.isFinite(value)) return;
        onCommit(value);
        onClose();
      }}
    >
      <TextInput
        size="xs"
        label={label}
        value={text}
        error={Number.isFinite(value) ? undefined : 'must be a number, like 7.2'}
        data-autofocus
        autoFocus
        onFocus={(event) => event.currentTarget.select()}
        onChange={(event) => setText(event.currentTarget.value)}
        onBlur={onClose}
        onKeyDown={(event) => {
          if (event.key !== 'Escape') return;
          event.stopPropagation();
          onClose();
        }}
      />
    </form>
  );
}
