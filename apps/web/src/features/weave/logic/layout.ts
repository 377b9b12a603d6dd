import type { SpinSystem } from '@heddle/shared';
import { axisTicks, ppmToX, rangeOfShifts, type PpmScale } from './scale';

/** What an arc stands for; each kind has a texture of its own. */
export type ArcKind = 'scalar' | 'dipolar' | 'exchange';

export interface Thread {
  id: string;
  isotope: string;
  count: number;
  shift: number;
  x: number;
  /** Stroke width in px, grows with the number of nuclei. */
  thickness: number;
  /** Row of the label, 0 next to the threads; labels that would touch stand in different rows. */
  labelRow: number;
}

/** Neighbouring threads that stand too close to tell apart, drawn as one until opened. */
export interface Bundle {
  ids: string[];
  x: number;
  count: number;
}

export interface Band {
  isotope: string;
  scale: PpmScale;
  ticks: number[];
  threads: Thread[];
  bundles: Bundle[];
  /** y of the parts of the band, px: arcs above `threadTop`, threads down to `axisY`, tick labels below. */
  top: number;
  threadTop: number;
  axisY: number;
  bottom: number;
}

export interface Arc {
  key: string;
  a: string;
  b: string;
  kind: ArcKind;
  /** J or dipolar constant in Hz, rate in 1/s; null when it follows from positions. */
  value: number | null;
  path: string;
  handle: { x: number; y: number };
  thickness: number;
}

export interface WeaveLayout {
  bands: Band[];
  arcs: Arc[];
  height: number;
}

export interface LayoutOptions {
  width: number;
  /** Range of the observed isotope's axis, shared with the spectrum below; other bands choose their own. */
  observed?: { isotope: string; high: number; low: number };
  /** Bundles that the reader has opened, by `bundleKey`. */
  opened: ReadonlySet<string>;
}

export const WEAVE = {
  marginX: 16,
  arcArea: 58,
  labelRow: 15,
  threadHeight: 46,
  axisHeight: 24,
  gap: 10,
  /** Threads closer than this many px fold into a bundle once a band holds more than `foldAbove` of them. */
  foldDistance: 9,
  foldAbove: 12,
  maxLabelRows: 3,
} as const;

/** Smallest width of an axis in ppm, so that a band of one thread is still an axis. */
const MINIMUM_RANGE: Record<string, number> = { '1H': 1 };
const OTHER_MINIMUM_RANGE = 10;

export function bundleKey(ids: readonly string[]): string {
  return ids.join('+');
}

/** Places bands, threads and arcs. One band an isotope, the observed one last so that it touches the spectrum. */
export function layoutWeave(system: SpinSystem, options: LayoutOptions): WeaveLayout {
  const bands: Band[] = [];
  let y = 0;
  for (const isotope of bandOrder(system, options.observed?.isotope)) {
    const band = placeBand(system, isotope, y, options);
    bands.push(band);
    y = band.bottom + WEAVE.gap;
  }
  return { bands, arcs: placeArcs(system, bands), height: Math.max(0, y - WEAVE.gap) };
}

function bandOrder(system: SpinSystem, observed: string | undefined): string[] {
  const isotopes = [...new Set(system.nuclei.map((nucleus) => nucleus.isotope))];
  return isotopes.sort((a, b) => Number(a === observed) - Number(b === observed));
}

function placeBand(system: SpinSystem, isotope: string, top: number, options: LayoutOptions): Band {
  const nuclei = system.nuclei.filter((nucleus) => nucleus.isotope === isotope);
  const range =
    options.observed?.isotope === isotope
      ? options.observed
      : rangeOfShifts(
          nuclei.map((nucleus) => nucleus.shift),
          MINIMUM_RANGE[isotope] ?? OTHER_MINIMUM_RANGE,
        );
  const scale: PpmScale = {
    high: range.high,
    low: range.low,
    left: WEAVE.marginX,
    width: options.width - 2 * WEAVE.marginX,
  };
  const threads = nuclei
    .map((nucleus) => ({
      id: nucleus.id,
      isotope,
      count: nucleus.count,
      shift: nucleus.shift,
      x: ppmToX(scale, nucleus.shift),
      thickness: 1.5 + 1.1 * Math.min(nucleus.count, 6),
      labelRow: 0,
    }))
    .sort((a, b) => a.x - b.x);
  const bundles = foldThreads(threads, options.opened);
  const folded = new Set(bundles.flatMap((bundle) => bundle.ids));
  const rows = placeLabels(threads.filter((thread) => !folded.has(thread.id)));
  const threadTop = top + WEAVE.arcArea + rows * WEAVE.labelRow;
  const axisY = threadTop + WEAVE.threadHeight;
  return {
    isotope,
    scale,
    ticks: axisTicks(range.high, range.low, Math.max(3, options.width / 110)),
    threads,
    bundles,
    top,
    threadTop,
    axisY,
    bottom: axisY + WEAVE.axisHeight,
  };
}

/** Runs of threads nearer than `foldDistance` in a crowded band, unless the reader opened them. */
function foldThreads(threads: readonly Thread[], opened: ReadonlySet<string>): Bundle[] {
  if (threads.length <= WEAVE.foldAbove) return [];
  const runs: Thread[][] = [];
  for (const thread of threads) {
    const run = runs.at(-1);
    if (run && thread.x - run.at(-1)!.x < WEAVE.foldDistance) run.push(thread);
    else runs.push([thread]);
  }
  return runs
    .filter((run) => run.length > 1 && !opened.has(bundleKey(run.map((thread) => thread.id))))
    .map((run) => ({
      ids: run.map((thread) => thread.id),
      x: run.reduce((sum, thread) => sum + thread.x, 0) / run.length,
      count: run.length,
    }));
}

/** Gives each label the lowest row in which it touches no other; returns the number of rows. */
function placeLabels(threads: Thread[]): number {
  const ends: number[] = [];
  for (const thread of threads) {
    const half = (thread.id.length * 7 + 10) / 2;
    let row = ends.findIndex((end) => end < thread.x - half);
    if (row < 0) row = Math.min(ends.length, WEAVE.maxLabelRows - 1);
    thread.labelRow = row;
    ends[row] = thread.x + half;
  }
  return Math.max(1, ends.length);
}

interface End {
  x: number;
  band: Band;
  row: number;
}

function placeArcs(system: SpinSystem, bands: readonly Band[]): Arc[] {
  const ends = new Map<string, End>();
  for (const band of bands) {
    for (const thread of band.threads) ends.set(thread.id, { x: thread.x, band, row: thread.labelRow });
    for (const bundle of band.bundles) for (const id of bundle.ids) ends.set(id, { x: bundle.x, band, row: 0 });
  }
  return arcValues(system).map(({ a, b, kind, value }) => {
    const [from, to] = [ends.get(a)!, ends.get(b)!];
    const thickness = arcThickness(kind, value);
    return { key: `${kind}:${a},${b}`, a, b, kind, value, thickness, ...arcPath(from, to, kind) };
  });
}

/** Every pair that is joined, with what joins it: J, dipolar coupling, or mutual exchange of shifts between states. */
function arcValues(system: SpinSystem): Pick<Arc, 'a' | 'b' | 'kind' | 'value'>[] {
  const pairs = system.couplings.flatMap(({ between: [a, b], j, dipolar }) => {
    const arcs: Pick<Arc, 'a' | 'b' | 'kind' | 'value'>[] = [];
    if (j !== 0 || dipolar === undefined) arcs.push({ a, b, kind: 'scalar', value: j });
    if (dipolar !== undefined) {
      arcs.push({ a, b, kind: 'dipolar', value: dipolar === 'positions' ? null : dipolar.constant });
    }
    return arcs;
  });
  return [...pairs, ...swappedPairs(system)];
}

/** Pairs of nuclei whose shifts change places between the two ends of an exchange step. */
function swappedPairs(system: SpinSystem): Pick<Arc, 'a' | 'b' | 'kind' | 'value'>[] {
  const states = new Map(system.states?.map((state) => [state.id, state]));
  const shiftIn = (state: string, id: string, own: number) => states.get(state)?.shifts[id] ?? own;
  return (system.exchange ?? []).flatMap((step) =>
    system.nuclei.flatMap((a, i) =>
      system.nuclei.slice(i + 1).flatMap((b) => {
        const before = [shiftIn(step.from, a.id, a.shift), shiftIn(step.from, b.id, b.shift)];
        const after = [shiftIn(step.to, a.id, a.shift), shiftIn(step.to, b.id, b.shift)];
        const swapped = before[0] !== before[1] && before[0] === after[1] && before[1] === after[0];
        return swapped ? [{ a: a.id, b: b.id, kind: 'exchange' as const, value: step.rate ?? null }] : [];
      }),
    ),
  );
}

/** Stroke width in px: the square root of |J| keeps 1 Hz and 150 Hz on one picture. */
function arcThickness(kind: ArcKind, value: number | null): number {
  if (kind === 'exchange' || value === null) return 2;
  const hertz = kind === 'dipolar' ? Math.abs(value) / 100 : Math.abs(value);
  return Math.min(7, 0.8 + 0.5 * Math.sqrt(hertz));
}

/** Arcs of a band rise above its threads; arcs between bands hang as one curve from thread to thread. */
function arcPath(from: End, to: End, kind: ArcKind): { path: string; handle: { x: number; y: number } } {
  const middle = (from.x + to.x) / 2;
  if (from.band === to.band) {
    const y = from.band.threadTop;
    const labels = y - (from.band.top + WEAVE.arcArea);
    const reach = Math.abs(to.x - from.x);
    const lift = { scalar: 0, dipolar: 7, exchange: 14 }[kind];
    const height = labels + Math.min(WEAVE.arcArea - 8, 12 + reach * 0.22) + lift * 0.4;
    return {
      path: `M${from.x} ${y}C${from.x} ${y - height * 1.33} ${to.x} ${y - height * 1.33} ${to.x} ${y}`,
      handle: { x: middle, y: y - height },
    };
  }
  const [upper, lower] = from.band.top < to.band.top ? [from, to] : [to, from];
  const [y0, y1] = [upper.band.axisY, lower.band.threadTop];
  const bend = (y1 - y0) * 0.5;
  return {
    path: `M${upper.x} ${y0}C${upper.x} ${y0 + bend} ${lower.x} ${y1 - bend} ${lower.x} ${y1}`,
    handle: { x: middle, y: (y0 + y1) / 2 },
  };
}
