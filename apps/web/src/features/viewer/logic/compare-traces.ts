import type { Spectrum } from '@heddle/shared';
import { indexAt, ppmAt } from './axis';

export interface ShownTrace {
  readonly label: string;
  readonly spectrum: Spectrum;
}

export type TraceLayout = 'overlay' | 'stack' | 'difference';

/** Traces as they are drawn: over one another, lifted one above the other, or the first less each of the others. */
export function stackTraces(traces: readonly ShownTrace[], layout: TraceLayout): ShownTrace[] {
  const [first, ...rest] = traces;
  if (rest.length === 0 || layout === 'overlay') return [...traces];
  if (layout === 'difference') {
    return [
      first,
      ...rest.map((other) => ({
        label: `${first.label} less ${other.label}`,
        spectrum: difference(first.spectrum, other.spectrum),
      })),
    ];
  }
  const tallest = Math.max(...traces.map(({ spectrum }) => highest(spectrum.real)));
  return traces.map(({ label, spectrum }, i) => ({ label, spectrum: lifted(spectrum, 0.35 * i * tallest) }));
}

/** `a` less `b` at the points of `a`; `b` counts as zero outside its window. */
export function difference(a: Spectrum, b: Spectrum): Spectrum {
  const last = b.real.length - 1;
  const real = a.real.map((value, i) => {
    const at = indexAt(b, ppmAt(a, i));
    if (at < 0 || at > last) return value;
    const below = Math.min(Math.floor(at), last - 1);
    return value - (b.real[below] + (at - below) * (b.real[below + 1] - b.real[below]));
  });
  return { ...a, real };
}

function lifted(spectrum: Spectrum, by: number): Spectrum {
  return by === 0 ? spectrum : { ...spectrum, real: spectrum.real.map((value) => value + by) };
}

function highest(values: Float64Array): number {
  let most = 0;
  for (const value of values) if (value > most) most = value;
  return most;
}
