/** Comma-separated tables of a result, RFC 4180: a header row, lines end in CRLF, numbers at full precision. */
import type { Result } from '../documents/result.js';

/** What of a result a table holds. */
export type CsvPart = 'spectrum' | 'fid' | 'lines';

/**
 * The spectrum (`ppm,real,imag`, highest ppm first, in nuclei per Hz), the FID (`seconds,real,imag`) or the line list
 * (`ppm,hz,intensity,nuclei`; only its header when the run has none).
 */
export function toCsv(result: Result, part: CsvPart = 'spectrum'): string {
  const rows = { spectrum: spectrumRows, fid: fidRows, lines: lineRows }[part](result);
  return rows.join('\r\n') + '\r\n';
}

function spectrumRows({ spectrum: { firstPpm, lastPpm, real, imag } }: Result): string[] {
  const step = (lastPpm - firstPpm) / (real.length - 1);
  return complexRows('ppm', (i) => firstPpm + i * step, real, imag);
}

function fidRows({ fid: { dwell, real, imag } }: Result): string[] {
  return complexRows('seconds', (i) => i * dwell, real, imag);
}

function complexRows(axis: string, x: (index: number) => number, real: Float64Array, imag: Float64Array): string[] {
  const rows = [`${axis},real,imag`];
  for (let i = 0; i < real.length; i++) rows.push(`${x(i)},${real[i]},${imag[i]}`);
  return rows;
}

function lineRows({ lines = [] }: Result): string[] {
  const rows = lines.map(({ ppm, hz, intensity, nuclei }) => `${ppm},${hz},${intensity},${nuclei.join(' ')}`);
  return ['ppm,hz,intensity,nuclei', ...rows];
}
