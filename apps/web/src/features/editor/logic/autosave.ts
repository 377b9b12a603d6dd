import type { Draft } from './draft';

/** What stands in the browser for one system until it is saved as a revision. */
export interface StoredDraft {
  readonly draft: Draft;
  /** The revision the edits started from; 0 for a new system. */
  readonly basedOn: number;
  readonly savedAt: string;
}

type Store = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>;

/** One key a system; a new system has one for each lab. */
export function draftKey(labId: string, systemId: string | null): string {
  return `heddle.draft/${labId}/${systemId ?? 'new'}`;
}

/** False when the browser refuses (full, or switched off): the page then says that the draft is not kept. */
export function storeDraft(store: Store, key: string, stored: StoredDraft): boolean {
  try {
    store.setItem(key, JSON.stringify(stored));
    return true;
  } catch {
    return false;
  }
}

/** The kept draft, or null when there is none or it can't be read. */
export function loadDraft(store: Store, key: string): StoredDraft | null {
  try {
    const value = JSON.parse(store.getItem(key) ?? 'null') as StoredDraft | null;
    return value && Array.isArray(value.draft?.nuclei) && Number.isInteger(value.basedOn) ? value : null;
  } catch {
    return null;
  }
}

export function dropDraft(store: Store, key: string): void {
  try {
    store.removeItem(key);
  } catch {
    // A store that can't be written holds no draft either.
  }
}

/** True when both drafts say the same, whatever the keys of their rows. */
export function sameDraft(a: Draft, b: Draft): boolean {
  return contents(a) === contents(b);
}

function contents(draft: Draft): string {
  const rows = (list: Draft['nuclei']) =>
    list
      .map(({ cells }) =>
        Object.entries(cells)
          .filter(([, text]) => text !== '')
          .sort(([x], [y]) => (x < y ? -1 : 1)),
      )
      .filter((row) => row.length > 0);
  const { name, notes, tauC, nuclei, couplings, states, exchange } = draft;
  return JSON.stringify([name, notes, tauC, rows(nuclei), rows(couplings), rows(states), rows(exchange)]);
}
