import { EngineError, fidToSpectrum, simulate } from '@heddle/shared';
import type { LiveReply, LiveRequest } from '../live.messages';

/** What a live picture may take before it is refused in favour of a queued run. Chosen so that a page stays pleasant. */
const LIMITS = { bytes: 512 * 2 ** 20, seconds: 10 };

/** Computes one request. The same function serves the worker and the tests. */
export function answer(request: LiveRequest, now: () => number): LiveReply {
  const start = now();
  try {
    if (request.kind === 'process') {
      const spectrum = fidToSpectrum(request.fid, request.experiment);
      return { kind: 'processed', spectrum, milliseconds: now() - start };
    }
    const {
      spectrum,
      fid,
      lines = [],
      report,
    } = simulate(request.system, request.experiment, { tick: () => undefined, limits: LIMITS });
    return { kind: 'simulated', spectrum, fid, lines, report, milliseconds: now() - start };
  } catch (error) {
    if (error instanceof EngineError) return { kind: 'refused', code: error.code, message: error.message };
    return { kind: 'refused', code: 'FAILED', message: error instanceof Error ? error.message : String(error) };
  }
}
