import { expect, it } from 'vitest';
import { pickPeaks } from './peaks';

/** Sum of two Lorentzians on 2001 points from 10 to 0 ppm; heights 1 and 0.5. */
function twoLines(first: number, second: number, width: number) {
  const real = Float64Array.from({ length: 2001 }, (_, i) => {
    const ppm = 10 - i / 200;
    const line = (at: number) => 1 / (1 + ((ppm - at) / (width / 2)) ** 2);
    return line(first) + 0.5 * line(second);
  });
  return { firstPpm: 10, lastPpm: 0, real, imag: new Float64Array(2001) };
}

it('finds maxima between the points, where the lines were put', () => {
  const [a, b] = pickPeaks(twoLines(7.2512, 3.1037, 0.1), 0.1);
  expect(a.ppm).toBeCloseTo(7.2512, 3);
  expect(b.ppm).toBeCloseTo(3.1037, 3);
  expect(a.height).toBeCloseTo(1, 2);
});

it('leaves out what does not reach the threshold', () => {
  expect(pickPeaks(twoLines(7.25, 3.1, 0.1), 0.6)).toHaveLength(1);
});

it('keeps the highest when there are too many', () => {
  expect(pickPeaks(twoLines(7.25, 3.1, 0.1), 0.1, 1)[0].ppm).toBeCloseTo(7.25, 3);
});
