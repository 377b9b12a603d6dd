import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { SparseRow, SparseRowsBuilder, type SparseRows } from '../relaxation/sparse-rows.js';
import { raising, type CoherenceBlock, type SpinSpace } from './spin-space.js';

/** R1 and R2 of one nucleus, s^-1. */
export interface NucleusRates {
  readonly r1: number;
  readonly r2: number;
}

/** Rates that "t1-t2" takes from the documents: t2 defaults to 1/(pi lineWidth), t1 to no longitudinal relaxation. */
export function nucleusRates(system: SpinSystem, experiment: Experiment, row: number): NucleusRates {
  const { t1, t2, lineWidth } = system.nuclei[row];
  return {
    r1: t1 === undefined ? 0 : 1 / t1,
    r2: t2 === undefined ? Math.PI * (lineWidth ?? experiment.lineWidth) : 1 / t2,
  };
}

/**
 * Uncorrelated random fields at each nucleus, on the coherences of one block:
 * Gamma = sum_n (R1/2)([Ix,[Ix,.]] + [Iy,[Iy,.]]) + (R2 - R1/2)[Iz,[Iz,.]]. With [Ix,[Ix,.]] + [Iy,[Iy,.]] =
 * {Ix^2 + Iy^2, .} - (I+ . I- + I- . I+), each row has at most 2 n + 1 entries. `rates` by particle.
 */
export function randomFieldMatrix(
  space: SpinSpace,
  rates: readonly NucleusRates[],
  block: Pick<CoherenceBlock, 'kets' | 'bras'>,
): SparseRows {
  const { particles, projections, strides, dimension } = space;
  const count = particles.length;
  const { kets, bras } = block;
  const index = new Map<number, number>();
  for (let i = 0; i < kets.length; i++) index.set(kets[i] * dimension + bras[i], i);
  const row = new SparseRow(kets.length);
  const rows = new SparseRowsBuilder();
  for (let i = 0; i < kets.length; i++) {
    const [ket, bra] = [kets[i], bras[i]];
    for (let p = 0; p < count; p++) {
      const { r1, r2 } = rates[p];
      const { spin } = particles[p];
      const [m, n] = [projections[ket * count + p], projections[bra * count + p]];
      const transverse = 2 * spin * (spin + 1) - m * m - n * n;
      row.add(i, (r1 / 2) * transverse + (r2 - r1 / 2) * (m - n) ** 2);
      if (r1 === 0) continue;
      const up = raising(spin, m) * raising(spin, n);
      const down = raising(spin, -m) * raising(spin, -n);
      if (up !== 0) row.add(index.get((ket - strides[p]) * dimension + bra - strides[p]), (-r1 / 2) * up);
      if (down !== 0) row.add(index.get((ket + strides[p]) * dimension + bra + strides[p]), (-r1 / 2) * down);
    }
    rows.push(row);
  }
  return rows.finish();
}
