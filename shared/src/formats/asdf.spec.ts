import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decodeTable, encodeDifdup } from './asdf.js';

const decode = (...lines: string[]) => [...decodeTable(lines.join('\n')).values];

describe('decodeTable', () => {
  it.each([
    ['AFFN', ['100 1 2 3 3 2 1 0 -1 -2 -3'], [1, 2, 3, 3, 2, 1, 0, -1, -2, -3]],
    ['PAC', ['100+1+2+3+3+2+1+0-1-2-3'], [1, 2, 3, 3, 2, 1, 0, -1, -2, -3]],
    ['SQZ', ['100ABCCBA@abc'], [1, 2, 3, 3, 2, 1, 0, -1, -2, -3]],
    ['DIF', ['100AJJ%jjjjjj', '110c'], [1, 2, 3, 3, 2, 1, 0, -1, -2, -3]],
    ['DIFDUP', ['100AJT%jX', '110c'], [1, 2, 3, 3, 2, 1, 0, -1, -2, -3]],
  ])('reads %s', (_form, lines, expected) => {
    // The same ten ordinates in each form, by the letters of McDonald and Wilks, Appl. Spectrosc. 42 (1988) 151.
    expect(decode(...lines)).toEqual(expected);
  });

  it('repeats the ordinate after SQZ and the difference after DIF', () => {
    expect(decode('0 B5T')).toEqual([25, 25]);
    expect(decode('0@KT', '2D')).toEqual([0, 2, 4]);
    expect(decode('0A%S0', '10A')).toEqual(new Array(11).fill(1)); // A%S0: ten differences of zero
  });

  it('repeats a check ordinate that carries a repeat count', () => {
    expect(decode('0AJJ', '2CT')).toEqual([1, 2, 3, 3]);
  });

  it('takes E as an exponent only before a sign and two or three digits', () => {
    expect(decode('0 1.5E+02 2.5E-01')).toEqual([150, 0.25]);
    expect(decode('0A1E5')).toEqual([11, 55]);
  });

  it('labels the repeated ordinate after a difference', () => {
    expect(decodeTable('100AJJ\n120CJ\n130D').labels).toEqual([
      { value: 100, index: 0 },
      { value: 120, index: 2 },
      { value: 130, index: 3 },
    ]);
  });

  it.each([
    ['a check that fails', '0AJJ\n2D', 'repeats 4 where the line before ended with 3'],
    ['a line that goes on without its check', '0AJJ\n2J', 'starts with a difference'],
    ['a missing ordinate', '0A?B', 'missing ordinate'],
    ['a repeat count beyond all measure', '0AZ999999999', 'asks for 8999999999 equal ordinates'],
    ['a sign that is no number', '0A!', "has '!'"],
    ['a line without abscissa', 'AJJ', "starts with 'A'"],
  ])('refuses %s', (_what, table, message) => {
    expect(() => decodeTable(table)).toThrow(message);
  });
});

describe('encodeDifdup', () => {
  const ordinate = fc.oneof(fc.integer({ min: -(2 ** 29), max: 2 ** 29 }), fc.integer({ min: -3, max: 3 }));
  const table = fc
    .array(fc.tuple(ordinate, fc.integer({ min: 1, max: 25 })), { minLength: 1, maxLength: 80 })
    .map((runs) => Int32Array.from(runs.flatMap(([value, count]) => new Array<number>(count).fill(value))))
    .filter((values) => values.length > 1);

  it('is undone by the decoder, keeps to 80 characters and labels each line', () => {
    fc.assert(
      fc.property(table, (values) => {
        const lines = encodeDifdup(values, String);
        expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(80);
        const decoded = decodeTable(lines.join('\r\n'));
        expect([...decoded.values]).toEqual([...values]);
        for (const label of decoded.labels) expect(label.value).toBe(label.index);
      }),
    );
  });

  it('writes the ordinates of the standard sample as the sample has them', () => {
    // First line of test/reference/jcamp/difdup-xydata.jdx, ordinates from expected.json beside it.
    const values = Int32Array.from([0, 0, 1, 3, 12, 40, 118, 255]);
    expect(encodeDifdup(values, (i) => String(2400 - 20 * i))).toEqual(['2400@%JKRK8P8J37', '2260B55']);
  });

  it('never puts a repeat count after an ordinate, which some readers take wrongly after a check', () => {
    fc.assert(
      fc.property(table, (values) => {
        expect(encodeDifdup(values, String).filter((line) => /^\d+[@A-Ia-i]\d*[S-Zs]/.test(line))).toEqual([]);
      }),
    );
  });
});
