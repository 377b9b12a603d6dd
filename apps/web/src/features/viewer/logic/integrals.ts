import type { Spectrum } from '@heddle/shared';
import { indexAt, type Range } from './axis';

/**
 * The integral of a spectrum over a stretch, in nuclei: sum of the real part times the spacing in Hz (trapezoids whose
 * ends are cut at the stretch's ends). `hzPerPpm` is the observed isotope's frequency in MHz.
 */
export function integrate(spectrum: Spectrum, range: Range, hzPerPpm: number): number {
  const { real } = spectrum;
  const last = real.length - 1;
  const from = Math.min(Math.max(indexAt(spectrum, range.high), 0), last);
  const to = Math.min(Math.max(indexAt(spectrum, range.low), 0), last);
  const spacing = ((spectrum.firstPpm - spectrum.lastPpm) / last) * hzPerPpm;
  const at = (x: number) => {
    const i = Math.min(Math.floor(x), last - 1);
    return real[i] + (x - i) * (real[i + 1] - real[i]);
  };
  let sum = 0;
  let here = from;
  while (here < to) {
    const next = Math.min(Math.floor(here) + 1, to);
    sum += ((at(here) + at(next)) / 2) * (next - here);
    here = next;
  }
  return sum * spacing;
}

/** The integral from the stretch's high end up to each of `count` evenly spaced places in it: the curve that is drawn. */
export function runningIntegral(spectrum: Spectrum, range: Range, hzPerPpm: number, count: number): Float64Array {
  const curve = new Float64Array(count);
  const step = (range.high - range.low) / (count - 1);
  for (let k = 1; k < count; k++) {
    const piece = { high: range.high - (k - 1) * step, low: range.high - k * step };
    curve[k] = curve[k - 1] + integrate(spectrum, piece, hzPerPpm);
  }
  return curve;
}
