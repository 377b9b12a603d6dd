import type { Experiment, Line, Report, Spectrum, SpinSystem } from '@heddle/shared';
import { useEffect, useRef, useState } from 'react';
import type { LiveReply, LiveRequest } from './live.messages';
import { LatestWins, type WorkerLike } from './logic/latest-wins';
import { previewOf } from './logic/preview';

export interface Picture {
  readonly spectrum: Spectrum;
  readonly lines: readonly Line[];
  readonly report: Report;
  readonly system: SpinSystem;
  readonly experiment: Experiment;
  readonly milliseconds: number;
}

export interface Refusal {
  readonly code: string;
  readonly message: string;
}

export interface Live {
  /** The last picture computed, also while the documents are unsound or a new one is on its way. */
  readonly picture: Picture | null;
  readonly computing: boolean;
  readonly refusal: Refusal | null;
}

type Simulate = Extract<LiveRequest, { kind: 'simulate' }>;

const STOPPED: Refusal = {
  code: 'FAILED',
  message: 'The live spectrum stopped working. Reload the page to start it again.',
};

export function createLiveWorker(): WorkerLike<LiveRequest> {
  return new Worker(new URL('./live.worker.ts', import.meta.url), { type: 'module' }) as WorkerLike<LiveRequest>;
}

/**
 * The spectrum of a system in an experiment, computed beside the page and following every change. Null stands for
 * documents that are not sound at the moment: the last picture then stays.
 */
export function useLive(system: SpinSystem | null, experiment: Experiment | null): Live {
  const [picture, setPicture] = useState<Picture | null>(null);
  const [answered, setAnswered] = useState<{ request: Simulate; refusal: Refusal | null } | null>(null);
  const queue = useRef<LatestWins<Simulate, LiveReply> | null>(null);

  useEffect(() => {
    const onReply = (reply: LiveReply, request: Simulate) => {
      setAnswered({ request, refusal: reply.kind === 'refused' ? reply : null });
      if (reply.kind === 'simulated') setPicture({ ...reply, system: request.system, experiment: request.experiment });
    };
    const onFailure = (request: Simulate) => setAnswered({ request, refusal: STOPPED });
    queue.current = new LatestWins<Simulate, LiveReply>(createLiveWorker, onReply, onFailure);
    return () => queue.current?.close();
  }, []);

  useEffect(() => {
    if (system && experiment) queue.current?.send({ kind: 'simulate', system, experiment: previewOf(experiment) });
  }, [system, experiment]);

  const computing = system !== null && experiment !== null && answered?.request.system !== system;
  return { picture, computing, refusal: answered?.refusal ?? null };
}
