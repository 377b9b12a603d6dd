import fc from 'fast-check';
import { expect, it } from 'vitest';
import { jsonPieces } from './write.js';

it('writes the JSON that JSON.stringify writes of the same tree with plain arrays', () => {
  const array = fc.array(fc.double({ noNaN: true, noDefaultInfinity: true }), { maxLength: 20_000, size: 'max' });
  fc.assert(
    fc.property(array, fc.jsonValue(), (numbers, value) => {
      const typed = { value, nested: { numbers: Float64Array.from(numbers), left: undefined } };
      expect([...jsonPieces(typed)].join('')).toBe(JSON.stringify({ value, nested: { numbers } }));
    }),
    { numRuns: 20 },
  );
});
