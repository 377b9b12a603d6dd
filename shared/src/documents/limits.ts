/** Limits of the documents, stated in one place for the schema, the forms and the docs. */
export const LIMITS = {
  groupCount: 12,
  states: 8,
  points: 2 ** 20,
  zeroFill: 2 ** 22,
  orientations: 1_000_000,
  gammas: 4096,
  steps: 500,
  phaseCycleRows: 256,
  echoLoops: 100_000,
  notes: 20_000,
  name: 200,
} as const;
