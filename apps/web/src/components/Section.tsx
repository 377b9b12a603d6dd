import { Text, Title } from '@mantine/core';
import { useId, type ReactNode } from 'react';
import classes from './Section.module.css';

/** A part of a page: its name in the margin, its content beside it, under a double rule. */
export function Section({ title, lead, children }: { title: string; lead?: ReactNode; children: ReactNode }) {
  const id = useId();
  return (
    <section className={classes.section} aria-labelledby={id}>
      <div>
        <Title order={2} id={id} fz={20} lh={1.3}>
          {title}
        </Title>
        {lead && (
          <Text size="sm" c="dimmed" mt={4}>
            {lead}
          </Text>
        )}
      </div>
      <div className={classes.content}>{children}</div>
    </section>
  );
}
