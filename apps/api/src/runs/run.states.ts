export const RUN_STATES = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export type RunState = (typeof RUN_STATES)[number];

/** Every move that a run may make. What is not here can't happen. */
export const NEXT: Record<RunState, readonly RunState[]> = {
  queued: ['running', 'cancelled'],
  // Back to queued when its worker is lost.
  running: ['done', 'failed', 'cancelled', 'queued'],
  failed: ['queued'],
  cancelled: ['queued'],
  done: [],
};

/** The states from which `state` can be reached. */
export function statesBefore(state: RunState): RunState[] {
  return RUN_STATES.filter((before) => NEXT[before].includes(state));
}
