/**
 * Product basis of spins K_p (total spins of groups), sorted into blocks by the total projection of every cluster.
 *   state     mixed-radix code, digit of spin p = K_p - m_p, the last spin varies fastest
 *   block     states with equal projections of all clusters
 *   ladder    blocks that differ in the projection of cluster 0 only, highest projection first
 */
export interface Sector {
  readonly spins: readonly number[];
  readonly cluster: readonly number[];
  /** Change of the code when the digit of spin p grows by one. */
  readonly stride: readonly number[];
  /** Place of each code within its block. */
  readonly place: Int32Array;
  readonly ladders: readonly (readonly Int32Array[])[];
}

export function buildSector(spins: readonly number[], cluster: readonly number[]): Sector {
  const stride = new Array<number>(spins.length);
  let size = 1;
  for (let p = spins.length - 1; p >= 0; p--) {
    stride[p] = size;
    size *= 2 * spins[p] + 1;
  }
  const clusters = Math.max(...cluster) + 1;
  const ladders = new Map<string, number[][]>();
  const digits = new Array<number>(spins.length).fill(0);
  const totals = new Array<number>(clusters).fill(0);
  for (let code = 0; code < size; code++) {
    const key = totals.slice(1).join();
    let ladder = ladders.get(key);
    if (!ladder) ladders.set(key, (ladder = []));
    (ladder[totals[0]] ??= []).push(code);
    advance(digits, totals, spins, cluster);
  }
  const place = new Int32Array(size);
  const blocks = [...ladders.values()].map((ladder) => ladder.map((codes) => Int32Array.from(codes)));
  for (const ladder of blocks) for (const codes of ladder) codes.forEach((code, index) => (place[code] = index));
  return { spins, cluster, stride, place, ladders: blocks };
}

/** Next code: digits count up like an odometer, `totals` follows the sum of digits of each cluster. */
function advance(digits: number[], totals: number[], spins: readonly number[], cluster: readonly number[]): void {
  for (let p = digits.length - 1; p >= 0; p--) {
    if (digits[p] < 2 * spins[p]) {
      digits[p]++;
      totals[cluster[p]]++;
      return;
    }
    totals[cluster[p]] -= digits[p];
    digits[p] = 0;
  }
}

/** m_p of the state `code`. */
export function projection(sector: Sector, code: number, p: number): number {
  const spin = sector.spins[p];
  return spin - (Math.floor(code / sector.stride[p]) % (2 * spin + 1));
}
