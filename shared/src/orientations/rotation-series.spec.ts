import { describe, expect, it } from 'vitest';
import { rotationMatrix } from '../algebra/rotation.js';
import { rotationSeries } from './rotation-series.js';

describe('rotationSeries', () => {
  it('begins at the start and comes round', () => {
    const series = rotationSeries([20, 50, 70], [0, 3, 0], 45, 9);
    expect(series).toHaveLength(9);
    for (const k of [0, 8]) {
      const [found, start] = [rotationMatrix(series[k]), rotationMatrix([20, 50, 70])];
      found.forEach((value, p) => expect(value).toBeCloseTo(start[p], 12));
    }
  });

  it('turns about z by the first Euler angle, about y by the second', () => {
    rotationSeries([0, 0, 0], [0, 0, 1], 30, 3).forEach((euler, k) => {
      const [found, wanted] = [rotationMatrix(euler), rotationMatrix([30 * k, 0, 0])];
      found.forEach((value, p) => expect(value).toBeCloseTo(wanted[p], 12));
    });
    rotationSeries([0, 10, 0], [0, 1, 0], 30, 3).forEach((euler, k) => {
      const [found, wanted] = [rotationMatrix(euler), rotationMatrix([0, 10 + 30 * k, 0])];
      found.forEach((value, p) => expect(value).toBeCloseTo(wanted[p], 12));
    });
  });

  it('refuses an axis without direction', () => {
    expect(() => rotationSeries([0, 0, 0], [0, 0, 0], 10, 2)).toThrow(RangeError);
  });
});
