/** Evenly spaced samples from `first` to `last` along some axis, in either direction. */
export interface Samples {
  readonly first: number;
  readonly last: number;
  readonly values: Float64Array;
}

/**
 * Two values for each of `columns` pixel columns between `from` and `to`: the extremes of the samples under the column,
 * in the order in which they come, so that no narrow line vanishes; between samples, the straight line that joins them.
 * `out` has 2 x columns entries; outside the samples they are NaN. Cost: samples in view + columns.
 */
export function columnTrace(
  samples: Samples,
  from: number,
  to: number,
  columns: number,
  out = new Float64Array(2 * columns),
): Float64Array {
  const { values } = samples;
  const last = values.length - 1;
  const perUnit = last / (samples.last - samples.first);
  const start = (from - samples.first) * perUnit;
  const step = ((to - from) * perUnit) / columns;
  for (let column = 0; column < columns; column++) {
    const [a, b] =
      step > 0
        ? [start + column * step, start + (column + 1) * step]
        : [start + (column + 1) * step, start + column * step];
    const head = Math.max(Math.ceil(a), 0);
    const tail = Math.min(Math.ceil(b) - 1, last);
    const at = 2 * column;
    if (tail - head < 1) {
      const middle = (a + b) / 2;
      const first = step > 0 ? a : b;
      for (let half = 0; half < 2; half++) {
        const inside = tail === head && head < middle === (step > 0 ? half === 0 : half === 1);
        out[at + half] = inside ? values[head] : between(values, first + (0.25 + half / 2) * step);
      }
      continue;
    }
    let [low, high] = [head, head];
    for (let i = head + 1; i <= tail; i++) {
      if (values[i] < values[low]) low = i;
      else if (values[i] > values[high]) high = i;
    }
    const lowFirst = step > 0 ? low < high : low > high;
    out[at] = values[lowFirst ? low : high];
    out[at + 1] = values[lowFirst ? high : low];
  }
  return out;
}

function between(values: Float64Array, at: number): number {
  const below = Math.floor(at);
  if (below < 0 || at > values.length - 1) return NaN;
  const share = at - below;
  return share === 0 ? values[below] : values[below] * (1 - share) + values[below + 1] * share;
}

/** The places of those values along the axis: a quarter and three quarters of each column. */
export function columnPlaces(from: number, to: number, columns: number): Float64Array {
  const step = (to - from) / columns;
  return Float64Array.from(
    { length: 2 * columns },
    (_, k) => from + (Math.floor(k / 2) + (k % 2 === 0 ? 0.25 : 0.75)) * step,
  );
}
