import { Text } from '@mantine/core';
import { larmorMHz } from '@heddle/shared';
import { useMemo } from 'react';
import { fullRange, narrowest, type Range } from '../viewer/logic/axis';
import { SpectrumPlot } from '../viewer/plot/SpectrumPlot';
import type { Live } from './useLive';
import classes from './LiveSpectrum.module.css';

/** The spectrum that follows the typing. It shares its axis with the weave above. */
export function LiveSpectrum({
  live,
  range,
  onRange,
  experimentSound,
}: {
  live: Live;
  range: Range | null;
  onRange(range: Range | null): void;
  experimentSound: boolean;
}) {
  const { picture, refusal, computing } = live;
  const traces = useMemo(
    () =>
      picture
        ? [
            {
              label: picture.experiment.observe,
              samples: {
                first: picture.spectrum.firstPpm,
                last: picture.spectrum.lastPpm,
                values: picture.spectrum.real,
              },
            },
          ]
        : [],
    [picture],
  );
  if (!picture) {
    return (
      <div className={classes.empty}>
        <Text c="dimmed" size="sm">
          {refusal?.message ?? (experimentSound ? 'The spectrum appears here.' : 'The experiment needs mending first.')}
        </Text>
      </div>
    );
  }
  const { spectrum, experiment, lines, milliseconds } = picture;
  return (
    <div className={classes.live}>
      <SpectrumPlot
        label={`Live ${experiment.observe} spectrum at ${experiment.protonMHz} MHz`}
        traces={traces}
        full={fullRange(spectrum)}
        range={range}
        onRange={onRange}
        height={300}
        least={narrowest(spectrum)}
        hzPerPpm={larmorMHz(experiment.observe, experiment.protonMHz)}
        lines={lines}
        stale={computing}
      />
      <Text size="xs" c="dimmed" className={classes.status} role="status">
        {refusal
          ? refusal.message
          : `${experiment.observe} at ${+experiment.protonMHz.toFixed(2)} MHz, computed in ${Math.max(1, Math.round(milliseconds))} ms`}
      </Text>
    </div>
  );
}
