import fc from 'fast-check';
import { expect, it } from 'vitest';
import { complexMatrix } from '../dense.js';
import { eigenHermitian } from './hermitian.js';
import { eigenSymmetric } from './symmetric.js';

it('solves A v = a v, and gives the doubled spectrum of the real matrix [[Re, -Im], [Im, Re]]', () => {
  const entries = fc.array(
    fc.integer({ min: -1000, max: 1000 }).map((x) => x / 1000),
    { minLength: 200, maxLength: 200 },
  );
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 10 }), entries, (n, numbers) => {
      const a = complexMatrix(n, n);
      for (let i = 0; i < n; i++) {
        for (let j = 0; j <= i; j++) {
          const [re, im] = [numbers[i * n + j], i === j ? 0 : numbers[100 + i * n + j]];
          a.real[i * n + j] = a.real[j * n + i] = re;
          a.imag[i * n + j] = im;
          a.imag[j * n + i] = -im;
        }
      }
      const { values, vectors } = eigenHermitian(a);
      for (let k = 0; k < n; k++) {
        for (let i = 0; i < n; i++) {
          let [re, im] = [-values[k] * vectors.real[k * n + i], -values[k] * vectors.imag[k * n + i]];
          for (let j = 0; j < n; j++) {
            const [x, y] = [vectors.real[k * n + j], vectors.imag[k * n + j]];
            re += a.real[i * n + j] * x - a.imag[i * n + j] * y;
            im += a.real[i * n + j] * y + a.imag[i * n + j] * x;
          }
          expect(Math.hypot(re, im)).toBeLessThan(1e-12);
        }
      }
      const doubled = new Float64Array(4 * n * n);
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          doubled[i * 2 * n + j] = doubled[(n + i) * 2 * n + n + j] = a.real[i * n + j];
          doubled[(n + i) * 2 * n + j] = a.imag[i * n + j];
          doubled[i * 2 * n + n + j] = -a.imag[i * n + j];
        }
      }
      const twice = eigenSymmetric(doubled, 2 * n).values;
      values.forEach((value, k) => expect(value).toBeCloseTo(twice[2 * k], 11));
    }),
  );
});
