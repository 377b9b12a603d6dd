import type { Spectrum } from '@heddle/shared';

/** A stretch of the ppm axis; `high` stands at the left. */
export interface Range {
  readonly high: number;
  readonly low: number;
}

/** The stretch that a spectrum covers. */
export function fullRange(spectrum: Spectrum): Range {
  return { high: spectrum.firstPpm, low: spectrum.lastPpm };
}

/** The narrowest stretch shown: a few points. */
export function narrowest(spectrum: Spectrum): number {
  return (8 * (spectrum.firstPpm - spectrum.lastPpm)) / (spectrum.real.length - 1);
}

/** Zooms by `factor` (< 1 zooms in) around `at`, inside `full` and no closer than `least` ppm. */
export function zoomRange(range: Range, at: number, factor: number, full: Range, least: number): Range {
  const width = Math.min(Math.max((range.high - range.low) * factor, least), full.high - full.low);
  const share = (range.high - at) / (range.high - range.low);
  return clampRange({ high: at + share * width, low: at - (1 - share) * width }, full);
}

/** Moves a stretch by a share of its width; positive moves to higher ppm. */
export function panRange(range: Range, share: number, full: Range): Range {
  const by = (range.high - range.low) * share;
  return clampRange({ high: range.high + by, low: range.low + by }, full);
}

/** Shifts a stretch into `full`, keeping its width where that fits. */
export function clampRange(range: Range, full: Range): Range {
  const width = Math.min(range.high - range.low, full.high - full.low);
  const high = Math.min(Math.max(range.high, full.low + width), full.high);
  return { high, low: high - width };
}

/** ppm of point `index`. */
export function ppmAt(spectrum: Spectrum, index: number): number {
  return spectrum.firstPpm + (index * (spectrum.lastPpm - spectrum.firstPpm)) / (spectrum.real.length - 1);
}

/** Fractional index of `ppm`, not clamped. */
export function indexAt(spectrum: Spectrum, ppm: number): number {
  return ((ppm - spectrum.firstPpm) / (spectrum.lastPpm - spectrum.firstPpm)) * (spectrum.real.length - 1);
}
