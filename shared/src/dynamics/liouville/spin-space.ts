import { nuclide } from '../../nuclides/nuclides.js';
import type { SpinSystem } from '../../documents/system.schema.js';

/** One spin of the product basis: a nucleus, or the total spin of a group. */
export interface Particle {
  /** Row of `system.nuclei`. */
  readonly row: number;
  readonly isotope: string;
  readonly spin: number;
}

/**
 * Zeeman product basis: states are numbered with the last particle varying fastest, each from m = +spin down.
 * `classes` part the particles into sets whose total projections the Hamiltonian and relaxation keep.
 */
export interface SpinSpace {
  readonly particles: readonly Particle[];
  readonly classes: readonly number[];
  readonly dimension: number;
  readonly strides: readonly number[];
  /** m of every particle in every state: entry state * particles + particle. */
  readonly projections: Float64Array;
  /** Total projection of every class in every state: entry state * classCount + class. */
  readonly totals: Float64Array;
  readonly classCount: number;
}

export function spinSpace(particles: readonly Particle[], classes: readonly number[]): SpinSpace {
  const count = particles.length;
  const strides = new Array<number>(count);
  let dimension = 1;
  for (let p = count - 1; p >= 0; p--) {
    strides[p] = dimension;
    dimension *= 2 * particles[p].spin + 1;
  }
  const classCount = Math.max(...classes) + 1;
  const projections = new Float64Array(dimension * count);
  const totals = new Float64Array(dimension * classCount);
  for (let state = 0; state < dimension; state++) {
    for (let p = 0; p < count; p++) {
      const { spin } = particles[p];
      const m = spin - (Math.floor(state / strides[p]) % (2 * spin + 1));
      projections[state * count + p] = m;
      totals[state * classCount + classes[p]] += m;
    }
  }
  return { particles, classes, dimension, strides, projections, totals, classCount };
}

/** The nuclei of `rows`, groups written out. */
export function expandedParticles(system: SpinSystem, rows: readonly number[]): Particle[] {
  return rows.flatMap((row) => {
    const { isotope, count } = system.nuclei[row];
    return Array.from({ length: count }, () => ({ row, isotope, spin: nuclide(isotope).spin }));
  });
}

/** <m+1|K+|m>, zero at the top. */
export function raising(spin: number, m: number): number {
  return Math.sqrt(Math.max(0, spin * (spin + 1) - m * (m + 1)));
}

/** A set of coherences |ket><bra|; all have the same order in every class. */
export interface CoherenceBlock {
  /** Order, m(ket) - m(bra), of each class. */
  readonly orders: readonly number[];
  readonly kets: Uint32Array;
  readonly bras: Uint32Array;
}

/**
 * All coherences of the space, sorted into blocks that free evolution keeps apart: by the orders of all classes, and where
 * nothing flips spins (`keepsTotals`) by the projections of ket and bra themselves.
 */
export function coherenceBlocks(space: SpinSpace, keepsTotals: boolean): CoherenceBlock[] {
  const { dimension, totals, classCount } = space;
  const blocks = new Map<string, { orders: number[]; kets: number[]; bras: number[] }>();
  const groups = new Map<string, number[]>();
  for (let state = 0; state < dimension; state++) {
    const key = Array.from(totals.subarray(state * classCount, (state + 1) * classCount)).join();
    const group = groups.get(key);
    if (group) group.push(state);
    else groups.set(key, [state]);
  }
  const byTotals = [...groups.values()];
  for (const kets of byTotals) {
    for (const bras of byTotals) {
      const orders = Array.from(
        { length: classCount },
        (_, c) => totals[kets[0] * classCount + c] - totals[bras[0] * classCount + c],
      );
      const key = keepsTotals ? `${kets[0]},${bras[0]}` : orders.join();
      let block = blocks.get(key);
      if (!block) blocks.set(key, (block = { orders, kets: [], bras: [] }));
      for (const ket of kets) {
        for (const bra of bras) {
          block.kets.push(ket);
          block.bras.push(bra);
        }
      }
    }
  }
  return [...blocks.values()].map(({ orders, kets, bras }) => ({
    orders,
    kets: Uint32Array.from(kets),
    bras: Uint32Array.from(bras),
  }));
}

/** For each block the index of the one with kets and bras exchanged. */
export function adjointBlocks(blocks: readonly CoherenceBlock[], dimension: number): Uint32Array {
  const blockOf = new Uint32Array(dimension * dimension);
  blocks.forEach(({ kets, bras }, b) => kets.forEach((ket, i) => (blockOf[ket * dimension + bras[i]] = b)));
  return Uint32Array.from(blocks, ({ kets, bras }) => blockOf[bras[0] * dimension + kets[0]]);
}

/** All n x n coherences, row-major. */
export function everyCoherence(n: number): Pick<CoherenceBlock, 'kets' | 'bras'> {
  const kets = new Uint32Array(n * n);
  const bras = new Uint32Array(n * n);
  for (let i = 0; i < n * n; i++) {
    kets[i] = Math.floor(i / n);
    bras[i] = i % n;
  }
  return { kets, bras };
}
