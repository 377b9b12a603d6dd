import { Progress } from '@mantine/core';
import type { Run, RunState } from '../api/types';
import { CancelledIcon, DoneIcon, FailedIcon, QueuedIcon, RunningIcon } from './icons';
import classes from './RunStateMark.module.css';

export const RUN_STATES: Record<RunState, { word: string; icon: typeof DoneIcon; colour: string }> = {
  queued: { word: 'Waiting', icon: QueuedIcon, colour: 'var(--ink-soft)' },
  running: { word: 'Running', icon: RunningIcon, colour: 'var(--indigo)' },
  done: { word: 'Done', icon: DoneIcon, colour: 'var(--ink)' },
  failed: { word: 'Failed', icon: FailedIcon, colour: 'var(--madder)' },
  cancelled: { word: 'Cancelled', icon: CancelledIcon, colour: 'var(--ink-soft)' },
};

/** State of a run: sign and word, with a bar while it runs. */
export function RunStateMark({ run }: { run: Pick<Run, 'state' | 'progress'> }) {
  const { word, icon: Icon, colour } = RUN_STATES[run.state];
  const percent = Math.floor(run.progress * 100);
  return (
    <span className={classes.mark} style={{ color: colour }}>
      <Icon />
      {word}
      {run.state === 'running' && (
        <>
          <Progress.Root size={4} className={classes.bar}>
            <Progress.Section value={percent} color="indigo" aria-label="Progress" />
          </Progress.Root>
          <span>{percent} %</span>
        </>
      )}
    </span>
  );
}
