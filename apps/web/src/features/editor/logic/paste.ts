import { newRow, type Draft, type Row } from './draft';
import type { Column, TableName } from './fields';

/** Rows of cells from a spreadsheet's clipboard: tabs, or else semicolons or commas, quoted cells included. */
export function splitCells(text: string): string[][] {
  const separator = text.includes('\t') ? '\t' : text.includes(';') ? ';' : ',';
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = '';
  let quoted = false;
  const endRow = () => {
    row.push(cell.trim());
    if (row.some((value) => value !== '')) rows.push(row);
    row = [];
    cell = '';
  };
  for (let i = 0; i < text.length; i++) {
    const char = text[i];
    if (quoted) {
      if (char === '"' && text[i + 1] === '"') cell += text[++i];
      else if (char === '"') quoted = false;
      else cell += char;
    } else if (char === '"' && cell.trim() === '') {
      quoted = true;
      cell = '';
    } else if (char === separator) {
      row.push(cell.trim());
      cell = '';
    } else if (char === '\n' || char === '\r') {
      if (char === '\r' && text[i + 1] === '\n') i += 1;
      endRow();
    } else cell += char;
  }
  endRow();
  return rows;
}

/** True when the text is more than one cell, so that it fills a block rather than goes into the cell as it is. */
export function isBlock(text: string): boolean {
  return /[\t\n]/.test(text.trim());
}

const plain = (text: string) =>
  text
    .toLowerCase()
    .replace(/[([].*$/, '')
    .trim();

/** The columns that a heading row names, or null when the first row is data. */
export function readHeadings(cells: readonly string[], columns: readonly Column[]): (Column | null)[] | null {
  const found = cells.map(
    (cell) =>
      columns.find((column) =>
        [column.field, column.label, ...(column.aliases ?? [])].some((name) => plain(name) === plain(cell)),
      ) ?? null,
  );
  const named = found.filter((column) => column !== null).length;
  return named > 0 && named * 2 >= cells.length && cells.every((cell) => !/^[+-]?\d/.test(cell)) ? found : null;
}

export interface PasteResult {
  readonly draft: Draft;
  readonly rows: number;
  /** Cells that lay beyond the last column and were not taken. */
  readonly dropped: number;
}

/**
 * Fills a block of cells from row `at` and column `from` on, adding rows as needed. A heading row sends each column
 * to its own place. Text is taken as it stands: what can't be read is shown with its error, never turned into a guess.
 */
export function pasteBlock(
  draft: Draft,
  table: TableName,
  columns: readonly Column[],
  at: { row: number; column: number },
  text: string,
  defaults: Record<string, string> = {},
): PasteResult {
  const block = splitCells(text);
  const headings = block.length > 0 ? readHeadings(block[0], columns) : null;
  const data = headings ? block.slice(1) : block;
  const target = (i: number) => (headings ? headings[i] : columns[at.column + i]) ?? null;
  const rows: Row[] = [...draft[table]];
  let dropped = 0;
  data.forEach((values, i) => {
    const index = Math.min(at.row + i, rows.length);
    const cells: Record<string, string> = { ...(rows[index]?.cells ?? defaults) };
    values.forEach((value, k) => {
      const column = target(k);
      if (!column) dropped += value === '' ? 0 : 1;
      else if (value === '') delete cells[column.field];
      else cells[column.field] = value;
    });
    rows[index] = rows[index] ? { ...rows[index], cells } : newRow(cells);
  });
  return { draft: data.length > 0 ? { ...draft, [table]: rows } : draft, rows: data.length, dropped };
}
