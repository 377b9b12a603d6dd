import fc from 'fast-check';
import { convert } from 'jcampconverter';
import { describe, expect, it } from 'vitest';
import { parseExperiment, parseSystem } from '../documents/parse.js';
import type { Result } from '../documents/result.js';
import { toJcamp } from './jcamp.js';
import { readJcamp } from './jcamp-reader.js';

/** A result with any ordinates: what they mean does not matter to a format. */
function resultOf(
  real: number[],
  imag: number[],
  { observe = '1H', name = 'Pair', firstPpm = 8.2, lastPpm = -1.3 } = {},
): Result {
  const system = parseSystem({
    format: 'heddle.spin-system/1',
    name,
    nuclei: [{ id: 'A', isotope: observe, shift: 1 }],
  });
  const experiment = parseExperiment({
    format: 'heddle.experiment/1',
    protonMHz: 400.13,
    observe,
    acquisition: { centre: 3.5, width: 4000, points: real.length },
  });
  return {
    format: 'heddle.result/1',
    system,
    experiment,
    spectrum: { firstPpm, lastPpm, real: Float64Array.from(real), imag: Float64Array.from(imag) },
    fid: { dwell: 1 / 4000, real: Float64Array.from(real), imag: Float64Array.from(imag) },
    report: { method: 'blocks', seconds: 0, dimensions: {}, approximations: [], warnings: [], engine: '1.0.0' },
  };
}

/** Nothing between 0 and 1e-280, where a double has no 29 bits left. */
const ordinate = fc.double({ min: -1e6, max: 1e6, noNaN: true }).map((value) => (Math.abs(value) < 1e-280 ? 0 : value));
const ordinates = fc
  .array(fc.tuple(ordinate, ordinate), { minLength: 1, maxLength: 200 })
  .map((pairs) => [...pairs, ...pairs])
  .map((pairs) => ({ real: pairs.map((pair) => pair[0]), imag: pairs.map((pair) => pair[1]) }));

const largest = (values: number[]) => Math.max(...values.map(Math.abs));

function expectClose(read: ArrayLike<number>, written: number[]): void {
  const tolerance = 1e-7 * largest(written);
  expect(read.length).toBe(written.length);
  written.forEach((value, i) => expect(Math.abs(read[i] - value)).toBeLessThanOrEqual(tolerance));
}

describe('toJcamp', () => {
  it('is read back by jcampconverter to the same numbers and the same ppm axis', () => {
    fc.assert(
      fc.property(ordinates, ({ real, imag }) => {
        const [entry] = convert(toJcamp(resultOf(real, imag))).flatten;
        expect(entry.xType).toBe('1H');
        expect(entry.spectra).toHaveLength(2);
        expectClose(entry.spectra[0].data.y, real);
        expectClose(entry.spectra[1].data.y, imag);
        const { x } = entry.spectra[0].data;
        const step = (-1.3 - 8.2) / (real.length - 1);
        x.forEach((ppm, i) => expect(ppm).toBeCloseTo(8.2 + i * step, 9));
      }),
    );
  });

  it('is read back by jcampconverter as an FID in seconds', () => {
    const real = [1, 0.5, -0.25, 0.125];
    const [entry] = convert(toJcamp(resultOf(real, [0, 1, 0, -1]), 'fid')).flatten;
    expect(entry.dataType).toBe('NMR FID');
    expect(entry.spectra[0].xUnits).toContain('SECONDS');
    expect(entry.spectra[0].data.x).toEqual([0, 1 / 4000, 2 / 4000, 3 / 4000]);
    expectClose(entry.spectra[0].data.y, real);
    expectClose(entry.spectra[1].data.y, [0, 1, 0, -1]);
  });

  it('passes the checks of that reader without a message', () => {
    const real = Array.from({ length: 3000 }, (_, i) => 1e3 / (1 + (i - 700.3) ** 2));
    const messages: string[] = [];
    const keep = (message: unknown) => messages.push(String(message));
    const logger = { trace: keep, debug: () => {}, info: keep, warn: keep, error: keep, fatal: keep };
    convert(toJcamp(resultOf(real, real)), { logger: logger as never });
    expect(messages.filter((message) => !message.includes('[object Object]'))).toEqual([]);
  });

  it('follows the rules of the format: 80 characters, CRLF, ASCII, title first, end last', () => {
    const text = toJcamp(resultOf([1, 2, 3, 2], [0, 0, 0, 0], { name: 'δ-lactone ##END= $$ comment\nsecond line é' }));
    const lines = text.split('\r\n');
    expect(lines[0]).toMatch(/^##TITLE= PREDICTED: /);
    expect(lines[1]).toBe('##JCAMP-DX= 5.01');
    expect(lines.slice(-2)).toEqual(['##END=', '']);
    expect(lines.filter((line) => line.length > 80 || !/^[ -~]*$/.test(line))).toEqual([]);
    expect(lines[0]).not.toMatch(/\$\$|.##/);
    expect(readJcamp(text)).toHaveLength(1);
  });

  it.each(['13C', '15N', '29Si', '195Pt'])('writes ppm of %s against its own frequency', (observe) => {
    const [entry] = convert(
      toJcamp(resultOf([0, 1, 0, 2], [0, 0, 0, 0], { observe, firstPpm: 120.5, lastPpm: -60.25 })),
    ).flatten;
    expect(entry.xType).toBe(observe);
    expect(entry.spectra[0].data.x[0]).toBeCloseTo(120.5, 9);
    expect(entry.spectra[0].data.x[3]).toBeCloseTo(-60.25, 9);
  });

  it('refuses ordinates that are not finite', () => {
    expect(() => toJcamp(resultOf([1, NaN], [0, 0]))).toThrow(RangeError);
    expect(() => toJcamp(resultOf([1, Infinity], [0, 0]))).toThrow(RangeError);
  });

  it('is read back by readJcamp as a referenced prediction', () => {
    const [block] = readJcamp(toJcamp(resultOf([0, 1, 0, 2], [3, 0, 0, 1])));
    expect(block).toMatchObject({
      kind: 'spectrum',
      isotope: '1H',
      observeMHz: 400.13,
      referenced: true,
      predicted: true,
      notes: [],
    });
    expect(block.first).toBeCloseTo(8.2, 9);
    expect(block.last).toBeCloseTo(-1.3, 9);
    expectClose(block.real, [0, 1, 0, 2]);
    expectClose(block.imag!, [3, 0, 0, 1]);
  });
});
