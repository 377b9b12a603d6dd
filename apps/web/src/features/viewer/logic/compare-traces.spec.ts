import { describe, expect, it } from 'vitest';
import { difference, stackTraces } from './compare-traces';

const spectrum = (firstPpm: number, lastPpm: number, values: number[]) => ({
  firstPpm,
  lastPpm,
  real: Float64Array.from(values),
  imag: new Float64Array(values.length),
});

describe('difference', () => {
  it('is zero between a spectrum and itself on another grid', () => {
    const a = spectrum(4, 0, [0, 1, 2, 3, 4]);
    const b = spectrum(4, 0, [0, 0.5, 1, 1.5, 2, 2.5, 3, 3.5, 4]);
    expect([...difference(a, b).real]).toEqual([0, 0, 0, 0, 0]);
  });

  it('takes nothing off outside the other window', () => {
    expect([...difference(spectrum(4, 0, [5, 5, 5, 5, 5]), spectrum(2, 1, [1, 1])).real]).toEqual([5, 5, 4, 4, 5]);
  });
});

describe('stackTraces', () => {
  const traces = [
    { label: 'a', spectrum: spectrum(1, 0, [0, 10]) },
    { label: 'b', spectrum: spectrum(1, 0, [0, 4]) },
  ];
  it('lifts each trace by the same share of the tallest', () => {
    const [first, second] = stackTraces(traces, 'stack');
    expect(first.spectrum.real[0]).toBe(0);
    expect(second.spectrum.real[0]).toBeCloseTo(3.5);
  });
  it('leaves an overlay as it is', () => expect(stackTraces(traces, 'overlay')).toEqual(traces));
});
