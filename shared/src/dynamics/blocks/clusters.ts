import type { ScalarCoupling } from '../../interactions/scalar.js';

/**
 * What decides the lines of one cluster of observed nuclei. A cluster is a set of like nuclei joined by J; its total Mz is
 * conserved, since clusters couple to one another by Iz Iz only. A nucleus that is a cluster by itself keeps its Iz.
 */
export interface ObservedPart {
  /** Rows of the nuclei whose states are mixed: the observed cluster first, then clusters that act on it. */
  readonly nuclei: readonly number[];
  /** Cluster of each entry of `nuclei`; 0 is the observed one. */
  readonly cluster: readonly number[];
  /** Rows of lone nuclei coupled to any of `nuclei`: their projections only shift frequencies. */
  readonly spectators: readonly number[];
}

/** One part for each cluster of nuclei of the isotope `observe`; `isotopes` and `couplings` by row of the system. */
export function observedParts(
  isotopes: readonly string[],
  couplings: readonly ScalarCoupling[],
  observe: string,
): ObservedPart[] {
  const clusters = components(isotopes.length, (a) =>
    couplings.filter(({ like }) => like).flatMap((coupling) => partner(coupling, a)),
  );
  const clusterOf = new Array<number>(isotopes.length);
  clusters.forEach((rows, index) => rows.forEach((row) => (clusterOf[row] = index)));
  const neighbours = clusters.map((rows) => [
    ...new Set(rows.flatMap((row) => couplings.flatMap((coupling) => partner(coupling, row)))),
  ]);
  return clusters.flatMap((rows, index) => {
    if (isotopes[rows[0]] !== observe) return [];
    const mobile = [index];
    const spectators = new Set<number>();
    for (const current of mobile) {
      for (const row of neighbours[current]) {
        const next = clusterOf[row];
        if (clusters[next].length === 1 && next !== index) spectators.add(row);
        else if (!mobile.includes(next)) mobile.push(next);
      }
    }
    return [
      {
        nuclei: mobile.flatMap((one) => clusters[one]),
        cluster: mobile.flatMap((one, place) => clusters[one].map(() => place)),
        spectators: [...spectators].sort((a, b) => a - b),
      },
    ];
  });
}

function partner({ a, b }: ScalarCoupling, row: number): number[] {
  return a === row ? [b] : b === row ? [a] : [];
}

/** Connected components of a graph on 0..count-1, each ascending. */
function components(count: number, neighboursOf: (node: number) => number[]): number[][] {
  const seen = new Array<boolean>(count).fill(false);
  const found: number[][] = [];
  for (let start = 0; start < count; start++) {
    if (seen[start]) continue;
    const members = [start];
    seen[start] = true;
    for (const node of members) {
      for (const next of neighboursOf(node)) {
        if (seen[next]) continue;
        seen[next] = true;
        members.push(next);
      }
    }
    found.push(members.sort((a, b) => a - b));
  }
  return found;
}
