/** Past, present and future of one value. `tag` names the edit that made the present, so that the next of its kind joins it. */
export interface History<T> {
  readonly past: readonly T[];
  readonly present: T;
  readonly future: readonly T[];
  readonly tag: string | null;
}

/** Steps kept. Found by trial to be far more than a person goes back; not derived. */
const DEPTH = 200;

export function startHistory<T>(present: T): History<T> {
  return { past: [], present, future: [], tag: null };
}

/** Records an edit. Edits in a row with the same tag (the keystrokes in one cell) are undone together. */
export function record<T>(history: History<T>, next: T, tag: string | null = null): History<T> {
  if (Object.is(next, history.present)) return history;
  if (tag !== null && tag === history.tag) return { ...history, present: next, future: [] };
  return { past: [...history.past, history.present].slice(-DEPTH), present: next, future: [], tag };
}

export function undo<T>(history: History<T>): History<T> {
  if (history.past.length === 0) return history;
  const present = history.past[history.past.length - 1];
  return { past: history.past.slice(0, -1), present, future: [history.present, ...history.future], tag: null };
}

export function redo<T>(history: History<T>): History<T> {
  if (history.future.length === 0) return history;
  const [present, ...future] = history.future;
  return { past: [...history.past, history.present], present, future, tag: null };
}
