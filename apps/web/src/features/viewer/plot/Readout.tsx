import type { Line } from '@heddle/shared';
import classes from './SpectrumPlot.module.css';

/** Where the pointer is, and the line under it with the nuclei that flip. */
export function Readout({
  at,
  line,
  unit,
  hzPerPpm,
}: {
  at: number;
  line: Line | null;
  unit: string;
  hzPerPpm?: number;
}) {
  return (
    <div className={classes.readout} aria-hidden="true">
      <span>
        {at.toFixed(4)} {unit}
      </span>
      {hzPerPpm !== undefined && <span>{(at * hzPerPpm).toFixed(2)} Hz</span>}
      {line && (
        <span className={classes.assigned}>
          {line.nuclei.join(' + ') || 'combination'}: {line.ppm.toFixed(4)} ppm, {line.intensity.toPrecision(3)}
        </span>
      )}
    </div>
  );
}
