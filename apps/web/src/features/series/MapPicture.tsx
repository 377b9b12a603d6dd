import { useElementSize } from '@mantine/hooks';
import { useEffect, useRef } from 'react';
import type { Spectrum } from '@heddle/shared';
import { useDyes } from '../../theme/useDyes';
import { ticks } from '../viewer/logic/drawing';
import type { Range } from '../viewer/logic/axis';
import { seriesMap } from './logic/map';

const LEFT = 86;
const BOTTOM = 28;

/** A series as a map: a band for each value, the darker the higher. The square root keeps small lines in sight. */
export function MapPicture({
  spectra,
  labels,
  range,
  height,
}: {
  spectra: readonly Spectrum[];
  labels: readonly string[];
  range: Range;
  height: number;
}) {
  const { ref, width } = useElementSize();
  const canvas = useRef<HTMLCanvasElement>(null);
  const dyes = useDyes();
  useEffect(() => {
    const element = canvas.current;
    const context = element?.getContext('2d');
    if (!element || !context || width < LEFT + 20) return;
    const ratio = Math.min(devicePixelRatio || 1, 2);
    element.width = width * ratio;
    element.height = height * ratio;
    context.scale(ratio, ratio);
    const plot = { width: width - LEFT - 8, height: height - BOTTOM };
    const columns = Math.max(1, Math.round(plot.width * ratio));
    const { values, rows } = seriesMap(spectra, range.high, range.low, columns);
    context.fillStyle = dyes.fleece;
    context.fillRect(LEFT, 0, plot.width, plot.height);
    context.fillStyle = dyes.indigo;
    const band = plot.height / rows;
    for (let row = 0; row < rows; row++) {
      // The first value lies at the bottom, as in the stack.
      const y = plot.height - (row + 1) * band;
      for (let column = 0; column < columns; column++) {
        context.globalAlpha = Math.sqrt(values[row * columns + column]);
        if (context.globalAlpha > 0.01) context.fillRect(LEFT + column / ratio, y, 1 / ratio + 0.3, band - 1);
      }
      context.globalAlpha = 1;
    }
    context.fillStyle = dyes.ink;
    context.font = "12px 'Plex Sans', sans-serif";
    context.textAlign = 'right';
    const every = Math.ceil(14 / band);
    labels.forEach((label, row) => {
      if (row % every === 0) context.fillText(label, LEFT - 8, plot.height - (row + 0.5) * band + 4, LEFT - 12);
    });
    context.textAlign = 'center';
    const { values: marks, decimals } = ticks(range, Math.max(2, plot.width / 90));
    for (const ppm of marks) {
      const x = LEFT + ((range.high - ppm) / (range.high - range.low)) * plot.width;
      context.fillText(ppm.toFixed(decimals), x, height - 8);
    }
  }, [width, height, spectra, labels, range, dyes]);
  return (
    <div ref={ref} style={{ height }}>
      <canvas
        ref={canvas}
        style={{ width: '100%', height }}
        role="img"
        aria-label={`Map of ${spectra.length} spectra, ${labels[0]} at the bottom to ${labels[labels.length - 1]} at the top`}
      />
    </div>
  );
}
