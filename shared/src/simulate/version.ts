/** Version of the engine: a run with equal documents and equal version gives the same numbers. Grows when they change. */
export const ENGINE_VERSION = '1.0.0';
