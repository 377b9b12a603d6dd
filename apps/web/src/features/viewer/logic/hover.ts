import type { Line } from '@heddle/shared';

/** The strongest line within `reach` ppm of `at`, or null. */
export function nearestLine(lines: readonly Line[], at: number, reach: number): Line | null {
  let best: Line | null = null;
  for (const line of lines) {
    if (Math.abs(line.ppm - at) > reach) continue;
    if (!best || Math.abs(line.intensity) > Math.abs(best.intensity)) best = line;
  }
  return best;
}

/** Vertical limits that show every trace whole: the base line stays in view, with a little air above and below. */
export function heights(traces: readonly Float64Array[]): { least: number; most: number } {
  let [least, most] = [0, 0];
  for (const values of traces) {
    for (const value of values) {
      if (value < least) least = value;
      else if (value > most) most = value;
    }
  }
  if (most === 0 && least === 0) return { least: -0.05, most: 1 };
  const air = 0.05 * Math.max(most, -least);
  return { least: least < -air ? least - air : -air, most: most > air ? most + air : air };
}
