import type { RedfieldTerm } from './redfield.js';
import { SparseRow, SparseRowsBuilder, type SparseRows } from './sparse-rows.js';

/** A ket |r> and a bra <c| of the Zeeman basis for each element of rho that is kept. */
export interface Coherences {
  readonly kets: ArrayLike<number>;
  readonly bras: ArrayLike<number>;
}

/**
 * Gamma, s^-1, restricted to the coherences given, which must be closed under Gamma: all of one order for each isotope, or
 * unions of such sets. Symmetric, zeros included. Row and column i belong to |kets[i]><bras[i]|.
 */
export function redfieldMatrix(
  terms: readonly RedfieldTerm[],
  dimension: number,
  { kets, bras }: Coherences,
): SparseRows {
  const index = new Map<number, number>();
  for (let i = 0; i < kets.length; i++) index.set(kets[i] * dimension + bras[i], i);
  const decay = decayMatrix(terms, dimension);
  const sum = new SparseRow(kets.length);
  const rows = new SparseRowsBuilder();
  for (let i = 0; i < kets.length; i++) {
    const [ket, bra] = [kets[i], bras[i]];
    for (let p = decay.start[ket]; p < decay.start[ket + 1]; p++) {
      sum.add(index.get(decay.rows[p] * dimension + bra), decay.values[p]);
    }
    for (let p = decay.start[bra]; p < decay.start[bra + 1]; p++) {
      sum.add(index.get(ket * dimension + decay.rows[p]), decay.values[p]);
    }
    for (const term of terms) addTransfer(sum, term, ket, bra, index, dimension);
    rows.push(sum);
  }
  return rows.finish();
}

/** Adds -sum over k of L_k |ket><bra| L_k^T. */
function addTransfer(
  sum: SparseRow,
  { start, rows, values }: RedfieldTerm,
  ket: number,
  bra: number,
  index: ReadonlyMap<number, number>,
  dimension: number,
): void {
  for (let p = start[ket]; p < start[ket + 1]; p++) {
    for (let q = start[bra]; q < start[bra + 1]; q++) {
      sum.add(index.get(rows[p] * dimension + rows[q]), -scalarProduct(values, p, values, q));
    }
  }
}

/** M = 1/2 sum of L L^T, by columns. */
function decayMatrix(terms: readonly RedfieldTerm[], dimension: number) {
  const sum = new SparseRow(dimension);
  const rows = new SparseRowsBuilder();
  const byRow = terms.map((term) => transposed(term, dimension));
  for (let c = 0; c < dimension; c++) {
    terms.forEach(({ start, rows: targets, values }, t) => {
      // (L L^T)_rc = sum over e of L_re L_ce: entries e of row c, then entries r of column e.
      const across = byRow[t];
      for (let p = across.start[c]; p < across.start[c + 1]; p++) {
        const e = across.columns[p];
        for (let q = start[e]; q < start[e + 1]; q++) {
          sum.add(targets[q], scalarProduct(values, across.entries[p], values, q) / 2);
        }
      }
    });
    rows.push(sum);
  }
  const { start, columns, values } = rows.finish();
  return { start, rows: columns, values };
}

/** For each row of a term: its columns, and where their entries are. */
function transposed({ start, rows }: RedfieldTerm, dimension: number) {
  const starts = new Uint32Array(dimension + 1);
  for (const row of rows) starts[row + 1]++;
  for (let r = 0; r < dimension; r++) starts[r + 1] += starts[r];
  const next = starts.slice();
  const columns = new Uint32Array(rows.length);
  const entries = new Uint32Array(rows.length);
  for (let c = 0; c < dimension; c++) {
    for (let p = start[c]; p < start[c + 1]; p++) {
      const at = next[rows[p]]++;
      columns[at] = c;
      entries[at] = p;
    }
  }
  return { start: starts, columns, entries };
}

/** Of the quintuples of two entries. */
function scalarProduct(a: Float64Array, p: number, b: Float64Array, q: number): number {
  let sum = 0;
  for (let k = 0, i = 5 * p, j = 5 * q; k < 5; k++, i++, j++) sum += a[i] * b[j];
  return sum;
}
