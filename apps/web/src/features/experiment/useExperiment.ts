import { useEffect, useMemo, useState } from 'react';
import type { SpinSystem } from '@heddle/shared';
import {
  checkExperimentDraft,
  startFor,
  withWindow,
  type CheckedExperiment,
  type ExperimentDraft,
} from './logic/experiment-draft';

export interface ExperimentState {
  readonly draft: ExperimentDraft;
  readonly checked: CheckedExperiment;
  edit(change: (draft: ExperimentDraft) => ExperimentDraft): void;
}

function load(key: string): ExperimentDraft | null {
  try {
    const value = JSON.parse(localStorage.getItem(key) ?? 'null') as ExperimentDraft | null;
    return value && typeof value.cells === 'object' ? value : null;
  } catch {
    return null;
  }
}

/** The experiment beside a system, kept in the browser; its window follows the shifts until one is typed. */
export function useExperiment(labId: string, systemId: string | null, system: SpinSystem | null): ExperimentState {
  const key = `heddle.experiment/${labId}/${systemId ?? 'new'}`;
  const [typed, setTyped] = useState<ExperimentDraft | null>(() => load(key));
  const draft = useMemo(() => withWindow(typed ?? startFor(system), system), [typed, system]);
  const checked = useMemo(() => checkExperimentDraft(draft, system), [draft, system]);
  useEffect(() => {
    try {
      if (typed) localStorage.setItem(key, JSON.stringify(typed));
    } catch {
      // A browser that keeps nothing loses only the settings of the next visit.
    }
  }, [key, typed]);
  return { draft, checked, edit: (change) => setTyped(change(draft)) };
}
