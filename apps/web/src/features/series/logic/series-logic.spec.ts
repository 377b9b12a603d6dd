import { expect, it } from 'vitest';
import { seriesMap } from './map';
import { readValues } from './words';

it('brings spectra on different axes onto one map, the highest point being 1', () => {
  const spectrum = (firstPpm: number, lastPpm: number, real: number[]) => ({
    firstPpm,
    lastPpm,
    real: Float64Array.from(real),
    imag: new Float64Array(real.length),
  });
  const { rows, columns, values } = seriesMap([spectrum(4, 0, [0, 0, 8, 0, 0]), spectrum(3, 1, [0, 4, 0])], 4, 0, 4);
  expect([rows, columns]).toEqual([2, 4]);
  expect(Math.max(...values.slice(0, 4))).toBe(1);
  expect(Math.max(...values.slice(4))).toBe(0.5);
  expect(values[0]).toBe(0);
});

it('reads values apart by blanks or commas, and says when one is no number', () => {
  expect(readValues('1, 2;3  4')).toEqual([1, 2, 3, 4]);
  expect(readValues('1 x')).toBeNull();
});
