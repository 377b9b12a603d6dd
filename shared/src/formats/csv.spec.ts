import { describe, expect, it } from 'vitest';
import type { Result } from '../documents/result.js';
import { toCsv } from './csv.js';

const result = {
  spectrum: { firstPpm: 2, lastPpm: 1, real: Float64Array.of(0.1, 1e-9, 3), imag: Float64Array.of(-0.2, 0, 1 / 3) },
  fid: { dwell: 0.25, real: Float64Array.of(1, 0.5), imag: Float64Array.of(0, -0.5) },
  lines: [{ ppm: 1.5, hz: 600, intensity: 1, nuclei: ['Ha', 'Hb'] }],
} as Partial<Result> as Result;

describe('toCsv', () => {
  it('writes the spectrum with an axis from first to last ppm', () => {
    expect(toCsv(result)).toBe('ppm,real,imag\r\n2,0.1,-0.2\r\n1.5,1e-9,0\r\n1,3,0.3333333333333333\r\n');
  });

  it('writes the FID and the lines', () => {
    expect(toCsv(result, 'fid')).toBe('seconds,real,imag\r\n0,1,0\r\n0.25,0.5,-0.5\r\n');
    expect(toCsv(result, 'lines')).toBe('ppm,hz,intensity,nuclei\r\n1.5,600,1,Ha Hb\r\n');
    expect(toCsv({ ...result, lines: undefined }, 'lines')).toBe('ppm,hz,intensity,nuclei\r\n');
  });
});
