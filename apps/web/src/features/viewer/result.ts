import { queryOptions } from '@tanstack/react-query';
import type { Experiment, Line, Report, SpinSystem, Spectrum } from '@heddle/shared';
import { toProblem } from '../../api/problem';
import { sessionFetch } from '../../api/session-fetch';

/** The result of a run as the viewer holds it: arrays as they came, no text in between. */
export interface RunResult {
  readonly system: SpinSystem;
  readonly experiment: Experiment;
  readonly spectrum: Spectrum;
  readonly fid: { dwell: number; real: Float64Array; imag: Float64Array };
  readonly lines?: readonly Line[];
  readonly report: Report;
}

type Header = Omit<RunResult, 'spectrum' | 'fid'> & {
  spectrum: { firstPpm: number; lastPpm: number };
  fid: { dwell: number };
};

export const resultQuery = (labId: string, runId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'result', runId],
    queryFn: async (): Promise<RunResult> => {
      const url = new URL(`/api/labs/${labId}/runs/${runId}/arrays`, location.origin);
      const response = await sessionFetch(new Request(url));
      if (!response.ok) throw toProblem(await response.json().catch(() => null), response.status);
      return decodeResult(await response.arrayBuffer());
    },
    staleTime: Infinity,
  });

/**
 * The server's binary form: length of a JSON header (32-bit little-endian), the header, the numbers of points of spectrum
 * and FID (32-bit each), then spectrum real, imag, FID real, imag as little-endian doubles. Throws a RangeError if cut short.
 */
export function decodeResult(buffer: ArrayBuffer): RunResult {
  const view = new DataView(buffer);
  const length = view.getUint32(0, true);
  const header = JSON.parse(new TextDecoder().decode(new Uint8Array(buffer, 4, length))) as Header;
  let at = 4 + length;
  const [points, samples] = [view.getUint32(at, true), view.getUint32(at + 4, true)];
  at += 8;
  const take = (count: number): Float64Array => {
    const array = new Float64Array(buffer.slice(at, at + 8 * count));
    if (array.length !== count) throw new RangeError('The result is cut short');
    at += 8 * count;
    return array;
  };
  const spectrum = { ...header.spectrum, real: take(points), imag: take(points) };
  return { ...header, spectrum, fid: { ...header.fid, real: take(samples), imag: take(samples) } };
}
