import { useQueryClient, type InfiniteData, type QueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { keys } from '../api/queries';
import { renewSession } from '../api/session-fetch';
import type { Page, Run, RunState } from '../api/types';

/** What the server says when a run moves on. */
export interface RunChange {
  id: string;
  state: RunState;
  progress: number;
}

/** How long to wait before listening again, and how often to ask while the server does not speak, ms. */
const RETRY = 10_000;
const POLL = 5_000;

/**
 * Keeps the runs of a laboratory up to date in the query cache: over server-sent events, and by asking every few seconds
 * while these are out of reach. Mounted once, by the shell; screens just read their queries.
 */
export function useLabEvents(labId: string): void {
  const queryClient = useQueryClient();
  useEffect(() => {
    let source: EventSource | undefined;
    let retry: ReturnType<typeof setTimeout> | undefined;
    let poll: ReturnType<typeof setInterval> | undefined;

    const pollStart = () => {
      poll ??= setInterval(() => void refreshRuns(queryClient, labId), POLL);
    };
    const pollStop = () => {
      clearInterval(poll);
      poll = undefined;
    };
    const listen = () => {
      source = new EventSource(`/api/labs/${labId}/events`);
      source.addEventListener('open', () => {
        if (poll) void refreshRuns(queryClient, labId);
        pollStop();
      });
      source.addEventListener('run', (event: MessageEvent<string>) => {
        applyRunChange(queryClient, labId, JSON.parse(event.data) as RunChange);
      });
      source.addEventListener('error', () => {
        pollStart();
        // The browser listens again by itself unless it was refused, as with an access token that has run out.
        if (source?.readyState === EventSource.CLOSED) {
          retry = setTimeout(() => void renewSession().then((renewed) => renewed && listen()), RETRY);
        }
      });
    };

    if ('EventSource' in window) listen();
    else pollStart();
    return () => {
      source?.close();
      clearTimeout(retry);
      pollStop();
    };
  }, [labId, queryClient]);
}

/** Writes a change into every cached list and page that shows the run; asks again for what the change does not carry. */
export function applyRunChange(queryClient: QueryClient, labId: string, change: RunChange): void {
  const before = queryClient.getQueryData<Run>(keys.run(labId, change.id))?.state;
  const patch = (run: Run): Run =>
    run.id === change.id ? { ...run, state: change.state, progress: change.progress } : run;

  let stateChanged = before !== undefined && before !== change.state;
  let listed = false;
  queryClient.setQueriesData<InfiniteData<Page<Run>>>({ queryKey: keys.runs(labId) }, (data) => {
    const known = data?.pages.flatMap((page) => page.items).find((run) => run.id === change.id);
    if (!data || !known) return data;
    listed = true;
    stateChanged ||= known.state !== change.state;
    return { ...data, pages: data.pages.map((page) => ({ ...page, items: page.items.map(patch) })) };
  });
  queryClient.setQueryData<Run>(keys.run(labId, change.id), (run) => run && patch(run));
  queryClient.setQueryData<{ running: Run[] }>(
    keys.today(labId),
    (today) => today && { ...today, running: today.running.map(patch) },
  );

  if (stateChanged || !listed) void refreshRuns(queryClient, labId);
}

async function refreshRuns(queryClient: QueryClient, labId: string): Promise<void> {
  await Promise.all([
    queryClient.invalidateQueries({ queryKey: keys.runs(labId) }),
    queryClient.invalidateQueries({ queryKey: [...keys.lab(labId), 'run'] }),
    queryClient.invalidateQueries({ queryKey: keys.today(labId) }),
  ]);
}
