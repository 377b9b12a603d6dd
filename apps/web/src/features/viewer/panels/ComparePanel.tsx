import { Checkbox, Group, SegmentedControl, Skeleton, Stack, Text } from '@mantine/core';
import { useInfiniteQuery } from '@tanstack/react-query';
import { runsQuery } from '../../../api/queries';
import type { Run } from '../../../api/types';
import { ExperimentSummary } from '../../../components/ExperimentSummary';
import { traceStyle } from '../../../theme/dyes';
import { useDyes } from '../../../theme/useDyes';
import { MOST_BESIDE, type ViewState } from '../logic/view-state';

/** Other finished runs that can be drawn with this one: over it, above it, or as the difference from it. */
export function ComparePanel({
  labId,
  run,
  view,
  onChange,
}: {
  labId: string;
  run: Run;
  view: ViewState;
  onChange(change: Partial<ViewState>): void;
}) {
  const dyes = useDyes();
  const { data, isPending } = useInfiniteQuery(runsQuery(labId, { state: 'done' }));
  const others = data?.pages.flatMap(({ items }) => items).filter(({ id }) => id !== run.id) ?? [];
  const sorted = [...others].sort(
    (a, b) => Number(b.system.id === run.system.id) - Number(a.system.id === run.system.id),
  );
  const toggle = (id: string, on: boolean) =>
    onChange({ beside: on ? [...view.beside, id].slice(0, MOST_BESIDE) : view.beside.filter((other) => other !== id) });
  if (isPending) return <Skeleton h={80} />;
  if (sorted.length === 0) return <Text c="dimmed">There is no other finished run yet.</Text>;
  return (
    <Stack gap="xs">
      <Group gap="sm">
        <SegmentedControl
          size="xs"
          aria-label="How runs are drawn together"
          data={[
            { value: 'overlay', label: 'Over one another' },
            { value: 'stack', label: 'Stacked' },
            { value: 'difference', label: 'Difference' },
          ]}
          value={view.layout}
          onChange={(layout) => onChange({ layout: layout })}
        />
      </Group>
      {sorted.slice(0, 40).map((other) => {
        const index = view.beside.indexOf(other.id);
        return (
          <Checkbox
            key={other.id}
            checked={index >= 0}
            disabled={index < 0 && view.beside.length >= MOST_BESIDE}
            onChange={(event) => toggle(other.id, event.currentTarget.checked)}
            label={
              <span style={index >= 0 ? { borderBottom: `3px solid ${dyes[traceStyle(index + 1).dye]}` } : undefined}>
                {other.system.name}, <ExperimentSummary run={other} />
              </span>
            }
          />
        );
      })}
    </Stack>
  );
}
