import { useEffect, useMemo, useState } from 'react';
import { draftKey, dropDraft, loadDraft, sameDraft, storeDraft } from './logic/autosave';
import { checkDraft, type CheckedDraft } from './logic/check';
import type { Draft } from './logic/draft';
import { record, redo, startHistory, undo } from './logic/history';

export interface DraftState {
  readonly draft: Draft;
  readonly checked: CheckedDraft;
  /** Whether the draft differs from the revision it began with. */
  readonly changed: boolean;
  /** The revision that the edits began with; an older one than the latest when the draft was kept from before. */
  readonly basedOn: number;
  /** The draft was found in the browser from an earlier visit. */
  readonly restored: boolean;
  readonly canUndo: boolean;
  readonly canRedo: boolean;
  /** `tag` joins keystrokes of one cell, or moves of one drag, into one step to undo. */
  edit(change: (draft: Draft) => Draft, tag?: string | null): void;
  undo(): void;
  redo(): void;
  /** Back to the revision; the kept draft is dropped. */
  discard(): void;
  /** Called when the draft has been saved as a revision. */
  forget(): void;
}

/** The draft of one system: its history, its check, and its copy in the browser that survives a reload. */
export function useDraft(labId: string, systemId: string | null, revision: number, start: Draft): DraftState {
  const key = draftKey(labId, systemId);
  const [kept] = useState(() => loadDraft(localStorage, key));
  const restored = kept !== null && !sameDraft(kept.draft, start);
  const [basedOn, setBasedOn] = useState(restored ? kept.basedOn : revision);
  const [history, setHistory] = useState(() => startHistory(restored ? kept.draft : start));
  const [wasRestored, setWasRestored] = useState(restored);
  const draft = history.present;
  const checked = useMemo(() => checkDraft(draft), [draft]);
  const changed = useMemo(() => !sameDraft(draft, start), [draft, start]);

  useEffect(() => {
    if (changed) storeDraft(localStorage, key, { draft, basedOn, savedAt: new Date().toISOString() });
    else dropDraft(localStorage, key);
  }, [changed, draft, basedOn, key]);

  return {
    draft,
    checked,
    changed,
    basedOn,
    restored: wasRestored,
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
    edit: (change, tag = null) => setHistory((now) => record(now, change(now.present), tag)),
    undo: () => setHistory(undo),
    redo: () => setHistory(redo),
    discard: () => {
      setHistory((now) => record(now, start));
      setBasedOn(revision);
      setWasRestored(false);
    },
    forget: () => dropDraft(localStorage, key),
  };
}
