import { Text, Title } from '@mantine/core';
import type { Approximation, Report } from '@heddle/shared';
import { inHertz, isDoubtful, ordered } from './logic/entries';
import classes from './LeftOut.module.css';

/** What a run leaves out, each entry with its size; a doubtful one is a reason not to trust the picture. */
export function LeftOut({ report, brief = false }: { report: Report; brief?: boolean }) {
  const entries = ordered(report.approximations).filter((entry) => !brief || entry.hz > 0);
  const shown = brief ? entries.slice(0, 4) : entries;
  return (
    <section className={classes.leftOut} aria-labelledby="left-out-title">
      <Title order={2} id="left-out-title" fz={17} mb={8}>
        What this run leaves out
      </Title>
      {report.warnings.map((warning) => (
        <p key={warning} className={classes.warning} role="note">
          {warning}
        </p>
      ))}
      {shown.length === 0 && <Text size="sm">Nothing of any size.</Text>}
      <ul className={classes.list}>
        {shown.map((entry) => (
          <Entry key={entry.id} entry={entry} brief={brief} />
        ))}
      </ul>
    </section>
  );
}

function Entry({ entry, brief }: { entry: Approximation; brief: boolean }) {
  const doubtful = isDoubtful(entry);
  return (
    <li className={classes.entry} data-doubtful={doubtful || undefined}>
      <span className={classes.name}>
        {entry.title}
        {doubtful && <span className={classes.flag}> mind this</span>}
      </span>
      <span className={classes.size}>{inHertz(entry.hz)}</span>
      {!brief && (
        <span className={classes.detail}>
          {entry.detail} {entry.made ? '' : 'Not made here. '}
          {entry.computed === 'exact-difference' ? 'Difference from the exact answer.' : 'Estimate.'}
        </span>
      )}
    </li>
  );
}
