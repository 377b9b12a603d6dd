import type { Line } from '@heddle/shared';
import { useElementSize } from '@mantine/hooks';
import { useEffect, useId, useMemo, useRef, useState, type KeyboardEvent, type ReactNode } from 'react';
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import { traceStyle } from '../../../theme/dyes';
import { useDyes } from '../../../theme/useDyes';
import { panRange, zoomRange, type Range } from '../logic/axis';
import { columnPlaces, columnTrace, type Samples } from '../logic/columns';
import type { DrawnIntegral } from '../logic/drawing';
import { heights, nearestLine } from '../logic/hover';
import { drawIntegrals, drawLineMarks, drawPeaks, type Overlay } from './overlays';
import { Readout } from './Readout';
import classes from './SpectrumPlot.module.css';

/** Space left and right of the plotted stretch, px. What shares the axis (the weave) keeps the same. */
export const PLOT_INSET = 16;

export interface PlotTrace {
  readonly label: string;
  readonly samples: Samples;
}

export interface SpectrumPlotProps {
  /** What the picture is, for a screen reader. */
  label: string;
  traces: readonly PlotTrace[];
  full: Range;
  /** Null shows all. */
  range: Range | null;
  onRange(range: Range | null): void;
  /** Vertical magnification. */
  scale?: number;
  onScale?(scale: number): void;
  onPrevious?(): void;
  height: number;
  /** Narrowest stretch that can be zoomed to. */
  least: number;
  unit?: string;
  /** The axis runs upwards from left to right, as for time; else it falls. */
  rising?: boolean;
  /** Hz of one ppm, to read differences in Hz. */
  hzPerPpm?: number;
  lines?: readonly Line[];
  peaks?: readonly { ppm: number; height: number }[];
  integrals?: readonly DrawnIntegral[];
  /** With it a drag marks a stretch instead of zooming. */
  onRegion?(range: Range): void;
  /** Greyed: the picture is older than what was typed. */
  stale?: boolean;
  children?: ReactNode;
}

const NO_LINES: readonly Line[] = [];
const ZOOM = 1.25;
/** Height above the tallest line that labels of peaks need, as a factor. */
const LABEL_ROOM = 1.2;

/** A spectrum (or FID) to look at closely: drag, wheel or keys zoom; Shift with the wheel, or up and down, scale it vertically. */
export function SpectrumPlot(props: SpectrumPlotProps) {
  const { traces, full, onRange, height, rising = false, scale = 1, onScale, lines = NO_LINES, unit = 'ppm' } = props;
  const range = props.range ?? full;
  const { ref: frame, width } = useElementSize();
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<uPlot | null>(null);
  const dyes = useDyes();
  const hintId = useId();
  const [hover, setHover] = useState<{ at: number; line: Line | null } | null>(null);
  const latest = useRef({ ...props, range, shown: NO_LINES });
  const columns = Math.max(1, Math.round((width - 2 * PLOT_INSET) * Math.min(globalThis.devicePixelRatio || 1, 2)));
  const limits = useMemo(() => heights(traces.map(({ samples }) => samples.values)), [traces]);
  const data = useMemo(
    () => [
      columnPlaces(range.low, range.high, columns),
      ...traces.map(({ samples }) => columnTrace(samples, range.low, range.high, columns)),
    ],
    [traces, range.low, range.high, columns],
  );

  useEffect(() => {
    latest.current = { ...props, range, shown: lines };
  });

  const zoom = (at: number, factor: number) => {
    const now = latest.current;
    const next = zoomRange(now.range, at, factor, now.full, now.least);
    now.onRange(next.high - next.low >= (now.full.high - now.full.low) * 0.9999 ? null : next);
  };

  useEffect(() => {
    if (!host.current || width <= 0) return;
    const overlay = (u: uPlot): Overlay => ({ u, dyes, range: latest.current.range });
    const series = traces.map((_, i): uPlot.Series => {
      const { dye, dash } = traceStyle(i);
      return { stroke: dyes[dye], width: 1.25, dash: [...dash], points: { show: false }, spanGaps: false };
    });
    const u = new uPlot(
      {
        width,
        height,
        padding: [8, PLOT_INSET, 0, PLOT_INSET],
        legend: { show: false },
        scales: { x: { time: false, dir: rising ? 1 : -1 }, y: { range: (_, low, high) => [low, high] } },
        axes: [
          {
            stroke: dyes.inkSoft,
            font: "12px 'Plex Sans', sans-serif",
            size: 30,
            gap: 4,
            space: 70,
            grid: { show: false },
            border: { show: true, stroke: dyes.edge, width: 1 },
            ticks: { stroke: dyes.edge, width: 1, size: 5 },
          },
          { show: false },
        ],
        series: [{}, ...series],
        cursor: { y: false, points: { show: false }, drag: { x: true, y: false, setScale: false, dist: 4 } },
        hooks: {
          setSelect: [
            (u) => {
              if (u.select.width < 4) return;
              const ends = [u.posToVal(u.select.left, 'x'), u.posToVal(u.select.left + u.select.width, 'x')];
              u.setSelect({ left: 0, top: 0, width: 0, height: 0 }, false);
              const chosen = { high: Math.max(...ends), low: Math.min(...ends) };
              if (latest.current.onRegion) latest.current.onRegion(chosen);
              else if (chosen.high - chosen.low > latest.current.least) latest.current.onRange(chosen);
            },
          ],
          setCursor: [
            (u) => {
              const left = u.cursor.left ?? -1;
              if (left < 0) return setHover(null);
              const at = u.posToVal(left, 'x');
              const reach = Math.abs(u.posToVal(left + 6, 'x') - at);
              setHover({ at, line: nearestLine(latest.current.shown, at, reach) });
            },
          ],
          draw: [
            (u) => {
              const { integrals = [], peaks = [] } = latest.current;
              drawIntegrals(overlay(u), integrals);
              drawLineMarks(overlay(u), latest.current.shown);
              drawPeaks(overlay(u), peaks);
            },
          ],
        },
      },
      [[], ...traces.map(() => [])],
      host.current,
    );
    plot.current = u;
    const onWheel = (event: WheelEvent) => {
      event.preventDefault();
      const factor = ZOOM ** Math.sign(event.deltaY || event.deltaX);
      if (event.shiftKey) latest.current.onScale?.((latest.current.scale ?? 1) / factor);
      else zoom(u.posToVal(event.offsetX, 'x'), factor);
    };
    const onDouble = () => latest.current.onRange(null);
    u.over.addEventListener('wheel', onWheel, { passive: false });
    u.over.addEventListener('dblclick', onDouble);
    return () => {
      plot.current = null;
      u.destroy();
    };
  }, [width > 0, traces.length, rising, dyes]); // eslint-disable-line react-hooks/exhaustive-deps -- sizes and data are set below without making a new plot

  useEffect(() => {
    const u = plot.current;
    if (!u) return;
    if (u.width !== width || u.height !== height) u.setSize({ width, height });
    u.batch(() => {
      u.setData(data, false);
      u.setScale('x', { min: range.low, max: range.high });
      u.setScale('y', {
        min: limits.least / scale,
        max: (limits.most / scale) * (props.peaks?.length ? LABEL_ROOM : 1),
      });
    });
  });

  const onKeyDown = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const middle = (range.high + range.low) / 2;
    const towards = rising ? -1 : 1;
    const actions: Record<string, () => void> = {
      ArrowLeft: () => onRange(panRange(range, 0.1 * towards, full)),
      ArrowRight: () => onRange(panRange(range, -0.1 * towards, full)),
      ArrowUp: () => onScale?.(scale * ZOOM),
      ArrowDown: () => onScale?.(scale / ZOOM),
      '+': () => zoom(middle, 1 / ZOOM),
      '=': () => zoom(middle, 1 / ZOOM),
      '-': () => zoom(middle, ZOOM),
      Home: () => onRange(null),
      '0': () => onRange(null),
      Backspace: () => props.onPrevious?.(),
    };
    const action = actions[event.key];
    if (!action) return;
    event.preventDefault();
    action();
  };

  return (
    <div
      ref={frame}
      className={classes.frame}
      data-stale={props.stale || undefined}
      style={{ height }}
      role="application"
      aria-roledescription="spectrum"
      aria-label={props.label}
      aria-describedby={hintId}
      tabIndex={0}
      onKeyDown={onKeyDown}
      onMouseLeave={() => setHover(null)}
    >
      <div ref={host} className={classes.host} />
      <span className={classes.unit} aria-hidden="true">
        {unit}
      </span>
      {hover && <Readout at={hover.at} line={hover.line} unit={unit} hzPerPpm={props.hzPerPpm} />}
      <span id={hintId} className={classes.hint}>
        Left and right move, plus and minus zoom, up and down scale, Home shows all.
      </span>
      {props.children}
    </div>
  );
}
