import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { SpinSystemInput } from '@heddle/shared';
import { client, unwrap } from '../../api/client';
import { Problem } from '../../api/problem';
import { keys } from '../../api/queries';
import type { System } from '../../api/types';
import { notifyDone, notifyFailure } from '../../lib/forms';
import { fromDocument } from './logic/draft';
import type { DraftState } from './useDraft';

/** Two versions of a system, when somebody else saved since the edits began. */
export interface SaveConflict {
  readonly theirs: { number: number; author: { name: string }; document: SpinSystemInput };
  readonly mine: SpinSystemInput;
}

export interface Save {
  readonly possible: boolean;
  /** What changed, in words; goes with the next save. */
  readonly note: string;
  setNote(note: string): void;
  readonly saving: boolean;
  readonly conflict: SaveConflict | null;
  now(): void;
  /** Saves if there is something to save; resolves with the system and the revision that holds the document. */
  saved(): Promise<{ systemId: string; revision: number }>;
  merge(document: SpinSystemInput): void;
  closeConflict(): void;
}

/** Saves the draft: as a new system, or as the next revision unless somebody was faster. */
export function useSave(labId: string, system: System | null, state: DraftState): Save {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const [note, setNote] = useState('');
  /** What the first save made, until the page of the new system has taken over. */
  const [made, setMade] = useState<{ systemId: string; revision: number } | null>(null);
  const [conflict, setConflict] = useState<SaveConflict | null>(null);
  const mutation = useMutation({
    mutationFn: async ({ document, basedOn }: { document: Record<string, unknown>; basedOn: number }) => {
      const words = note.trim() === '' ? {} : { note: note.trim() };
      if (!system) {
        const made = await unwrap(
          client.POST('/api/labs/{labId}/systems', { params: { path: { labId } }, body: { document, ...words } }),
        );
        return { systemId: made.id, revision: made.latestRevision };
      }
      const { number } = await unwrap(
        client.POST('/api/labs/{labId}/systems/{id}/revisions', {
          params: { path: { labId, id: system.id } },
          body: { basedOn, document, ...words },
        }),
      );
      return { systemId: system.id, revision: number };
    },
    onSuccess: async ({ systemId, revision }) => {
      if (!system) setMade({ systemId, revision });
      state.forget();
      setNote('');
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: keys.systems(labId) }),
        queryClient.invalidateQueries({ queryKey: keys.system(labId, systemId) }),
        queryClient.invalidateQueries({ queryKey: keys.today(labId) }),
      ]);
      notifyDone(system ? `Saved as revision ${revision}.` : 'Saved.');
    },
    onError: (error, { document }) => {
      if (error instanceof Problem && error.status === 409) {
        const body = error.body as { current: SaveConflict['theirs'] };
        setConflict({ theirs: body.current, mine: document as unknown as SpinSystemInput });
      } else notifyFailure('Not saved', error);
    },
  });
  const possible = state.checked.system !== null && (state.changed || !system) && !made && !mutation.isPending;
  const document = state.checked.document;
  const open = async ({ systemId }: { systemId: string }) => {
    if (!system) await navigate(`/labs/${labId}/systems/${systemId}`, { replace: true });
  };
  return {
    possible,
    note,
    setNote,
    saving: mutation.isPending,
    conflict,
    now: () => {
      if (possible) mutation.mutate({ document, basedOn: state.basedOn }, { onSuccess: (saved) => void open(saved) });
    },
    saved: async () => {
      if (made) return made;
      if (system && !state.changed) return { systemId: system.id, revision: state.basedOn };
      return mutation.mutateAsync({ document, basedOn: state.basedOn });
    },
    merge: (merged) => {
      const basedOn = conflict!.theirs.number;
      setConflict(null);
      state.edit(() => fromDocument(merged));
      mutation.mutate({ document: merged, basedOn });
    },
    closeConflict: () => setConflict(null),
  };
}
