/** What a computation asks of its surroundings: to hear how far it is, to stop it, and the limits it must keep. */
export interface RunContext {
  /** Called now and then with the fraction done, 0..1. Throws an EngineError 'CANCELLED' to stop the run. */
  tick(fraction: number): void;
  limits?: RunLimits;
}

export interface RunLimits {
  bytes: number;
  seconds: number;
}

/** Used where nobody listens: never cancels, one GiB, ten minutes. */
export const SILENT: RunContext = { tick: () => undefined, limits: { bytes: 2 ** 30, seconds: 600 } };

export type EngineErrorCode = 'TOO_LARGE' | 'NO_CONVERGENCE' | 'CANCELLED' | 'UNSUPPORTED';

/** A run that can't be done. `path` names the field of the document that is to blame, where there is one. */
export class EngineError extends Error {
  constructor(
    readonly code: EngineErrorCode,
    message: string,
    readonly path = '',
  ) {
    super(message);
    this.name = 'EngineError';
  }
}
