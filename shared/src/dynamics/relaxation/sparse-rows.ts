/** A square sparse matrix by rows: row r holds entries `start[r]` to `start[r + 1]`. */
export interface SparseRows {
  readonly start: Uint32Array;
  readonly columns: Uint32Array;
  readonly values: Float64Array;
}

/** One row under construction: a dense sum and the list of what was touched. */
export class SparseRow {
  readonly touched: number[] = [];
  readonly values: Float64Array;
  private readonly seen: Uint8Array;

  constructor(size: number) {
    this.values = new Float64Array(size);
    this.seen = new Uint8Array(size);
  }

  /** Throws a RangeError for a place outside the set of coherences: that set was not closed. */
  add(column: number | undefined, value: number): void {
    if (column === undefined) throw new RangeError('The coherences are not closed under relaxation');
    if (this.seen[column] === 0) {
      this.seen[column] = 1;
      this.touched.push(column);
    }
    this.values[column] += value;
  }

  clear(): void {
    for (const column of this.touched) {
      this.values[column] = 0;
      this.seen[column] = 0;
    }
    this.touched.length = 0;
  }
}

export class SparseRowsBuilder {
  private readonly start = [0];
  private readonly columns: number[] = [];
  private readonly values: number[] = [];

  /** Appends the row, sorted, and clears it. */
  push(row: SparseRow): void {
    for (const column of row.touched.sort((a, b) => a - b)) {
      this.columns.push(column);
      this.values.push(row.values[column]);
    }
    this.start.push(this.columns.length);
    row.clear();
  }

  finish(): SparseRows {
    return {
      start: Uint32Array.from(this.start),
      columns: Uint32Array.from(this.columns),
      values: Float64Array.from(this.values),
    };
  }
}
