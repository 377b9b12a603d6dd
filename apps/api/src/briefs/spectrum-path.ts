import type { Spectrum } from '@heddle/shared';

/** Where a spectrum is drawn, in points from the top left of the page. */
export interface Frame {
  left: number;
  top: number;
  width: number;
  height: number;
}

/**
 * The absorption as a path inside a frame, highest ppm at the left: both extremes of the points under each of `columns`
 * columns, so that no narrow line is lost.
 */
export function spectrumPath({ real }: Spectrum, { left, top, width, height }: Frame, columns: number): string {
  let [least, most] = [0, 0];
  for (const y of real) {
    if (y < least) least = y;
    if (y > most) most = y;
  }
  const span = most - least || 1;
  const y = (value: number) => (top + height * (1 - (value - least) / span)).toFixed(2);
  const points: string[] = [];
  const per = real.length / columns;
  for (let column = 0; column < columns; column++) {
    const from = Math.floor(column * per);
    const to = Math.max(from + 1, Math.floor((column + 1) * per));
    let [low, high] = [from, from];
    for (let i = from; i < to && i < real.length; i++) {
      if (real[i] < real[low]) low = i;
      if (real[i] > real[high]) high = i;
    }
    for (const i of [low, high].sort((a, b) => a - b)) {
      points.push(`${(left + (width * i) / (real.length - 1)).toFixed(2)} ${y(real[i])}`);
    }
  }
  return `M${points.join('L')}`;
}

/** Round ppm values inside the window, about `wanted` of them. */
export function ppmTicks({ firstPpm, lastPpm }: Spectrum, wanted: number): number[] {
  const raw = (firstPpm - lastPpm) / wanted;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= raw) ?? 10 * power;
  const ticks: number[] = [];
  for (let k = Math.floor(firstPpm / step); k * step >= lastPpm; k--) ticks.push(+(k * step).toPrecision(10));
  return ticks;
}
