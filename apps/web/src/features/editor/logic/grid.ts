export interface Place {
  readonly row: number;
  readonly column: number;
}

export interface GridKey {
  readonly key: string;
  readonly ctrl: boolean;
}

/**
 * Where a key moves the one focused cell of a grid (WAI-ARIA grid pattern), or null when the key moves nothing.
 * Movement stops at the edges.
 */
export function moveInGrid({ key, ctrl }: GridKey, at: Place, rows: number, columns: number): Place | null {
  const last = { row: rows - 1, column: columns - 1 };
  const to = (row: number, column: number): Place => ({
    row: Math.min(Math.max(row, 0), last.row),
    column: Math.min(Math.max(column, 0), last.column),
  });
  switch (key) {
    case 'ArrowUp':
      return ctrl ? to(0, at.column) : to(at.row - 1, at.column);
    case 'ArrowDown':
      return ctrl ? to(last.row, at.column) : to(at.row + 1, at.column);
    case 'ArrowLeft':
      return ctrl ? to(at.row, 0) : to(at.row, at.column - 1);
    case 'ArrowRight':
      return ctrl ? to(at.row, last.column) : to(at.row, at.column + 1);
    case 'Home':
      return ctrl ? to(0, 0) : to(at.row, 0);
    case 'End':
      return ctrl ? to(last.row, last.column) : to(at.row, last.column);
    case 'PageUp':
      return to(at.row - 10, at.column);
    case 'PageDown':
      return to(at.row + 10, at.column);
    default:
      return null;
  }
}

/** The cell after `at` in reading order, for Tab while editing; null at either end. */
export function nextCell(at: Place, rows: number, columns: number, by: -1 | 1): Place | null {
  const index = at.row * columns + at.column + by;
  if (index < 0 || index >= rows * columns) return null;
  return { row: Math.floor(index / columns), column: index % columns };
}
