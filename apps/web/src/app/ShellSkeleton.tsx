import { Container, Skeleton, Stack } from '@mantine/core';
import { Mark } from '../theme/Mark';
import classes from './Shell.module.css';

/** The frame while the session is asked for: same heights, so that nothing jumps. */
export function ShellSkeleton() {
  return (
    <div className={classes.shell} aria-busy="true">
      <div className={classes.header}>
        <div className={classes.bar}>
          <span className={classes.brand}>
            <Mark />
            <span>Heddle</span>
          </span>
        </div>
        <div className={`warp ${classes.band}`} />
      </div>
      <Container size={1200} py="xl" px="lg" w="100%">
        <Skeleton h={36} w={220} mb="xl" />
        <Stack gap="sm">
          <Skeleton h={20} />
          <Skeleton h={20} />
          <Skeleton h={20} w="70%" />
        </Stack>
      </Container>
    </div>
  );
}
