/** Maps ppm to pixels on an axis that falls to the right: the highest ppm stands at the left edge. */
export interface PpmScale {
  /** Highest ppm, at `left`. */
  high: number;
  /** Lowest ppm, at `left + width`. */
  low: number;
  left: number;
  width: number;
}

export function ppmToX(scale: PpmScale, ppm: number): number {
  return scale.left + ((scale.high - ppm) / (scale.high - scale.low)) * scale.width;
}

export function xToPpm(scale: PpmScale, x: number): number {
  return scale.high - ((x - scale.left) / scale.width) * (scale.high - scale.low);
}

/** The ppm range that shows all `shifts` with a margin of a tenth on both sides, at least `minimum` ppm wide. */
export function rangeOfShifts(shifts: readonly number[], minimum: number): { high: number; low: number } {
  const top = Math.max(...shifts);
  const bottom = Math.min(...shifts);
  const span = Math.max(top - bottom, minimum);
  const middle = (top + bottom) / 2;
  return { high: middle + span * 0.6, low: middle - span * 0.6 };
}

/** Round tick values inside a range, highest first, about `wanted` of them. */
export function axisTicks(high: number, low: number, wanted: number): number[] {
  const raw = (high - low) / wanted;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= raw)!;
  const ticks: number[] = [];
  for (let index = Math.floor(high / step); index * step >= low; index--) ticks.push(+(index * step).toPrecision(12));
  return ticks;
}

/** Decimals that tell neighbouring ticks apart. */
export function tickDecimals(ticks: readonly number[]): number {
  if (ticks.length < 2) return 1;
  return Math.max(0, -Math.floor(Math.log10(Math.abs(ticks[0] - ticks[1])) + 1e-9));
}
