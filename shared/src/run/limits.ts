import { EngineError, type RunContext } from './context.js';

/** Throws an EngineError TOO_LARGE that tells the estimate, and names the field to blame, when a run would break the context's limits. */
export function refuseBeyond(
  cost: { bytes: number; seconds: number },
  { limits }: RunContext,
  why: string,
  path = 'nuclei',
): void {
  if (!limits || (cost.bytes <= limits.bytes && cost.seconds <= limits.seconds)) return;
  throw new EngineError(
    'TOO_LARGE',
    `this needs about ${amount(cost.bytes / 2 ** 20)} MiB and ${amount(cost.seconds)} s (${why}); ` +
      `the limits are ${amount(limits.bytes / 2 ** 20)} MiB and ${amount(limits.seconds)} s`,
    path,
  );
}

function amount(value: number): string {
  if (!Number.isFinite(value)) return 'no end of';
  return value >= 100 ? Math.round(value).toLocaleString('en') : value.toPrecision(2);
}
