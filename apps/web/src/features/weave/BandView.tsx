import type { KeyboardEvent, PointerEvent } from 'react';
import { bundleKey, WEAVE, type Band, type Bundle, type Thread } from './logic/layout';
import { ppmToX, tickDecimals } from './logic/scale';
import { shiftStep } from './logic/steps';
import classes from './Weave.module.css';

interface BandViewProps {
  band: Band;
  width: number;
  selected: string | null;
  partners: ReadonlySet<string> | null;
  onSelect(id: string | null): void;
  onDrag(event: PointerEvent, thread: Thread): void;
  onStep(thread: Thread, change: number): void;
  onType(thread: Thread): void;
  onOpen(key: string): void;
}

/** Ticks further left have no number: the isotope's name stands there, px. */
const ISOTOPE_ROOM = 44;

/** The band of one isotope: its axis and its threads. */
export function BandView({ band, width, selected, partners, onSelect, onDrag, onStep, onType, onOpen }: BandViewProps) {
  const folded = new Set(band.bundles.flatMap((bundle) => bundle.ids));
  const decimals = tickDecimals(band.ticks);
  const mass = /^\d+/.exec(band.isotope)![0];
  return (
    <g role="group" aria-label={`${band.isotope}, ${band.threads.length} nuclei`}>
      <rect x={0} y={band.threadTop} width={width} height={WEAVE.threadHeight} className={classes.cloth} />
      <text x={4} y={band.axisY + 17} className={classes.isotope}>
        <tspan dy={-4} className={classes.mass}>
          {mass}
        </tspan>
        <tspan dy={4}>{band.isotope.slice(mass.length)}</tspan>
      </text>
      <line x1={WEAVE.marginX} x2={width - WEAVE.marginX} y1={band.axisY} y2={band.axisY} className={classes.axis} />
      {band.ticks.map((tick) => (
        <g key={tick} aria-hidden>
          <line
            x1={ppmToX(band.scale, tick)}
            x2={ppmToX(band.scale, tick)}
            y1={band.axisY}
            y2={band.axisY + 4}
            className={classes.axis}
          />
          {ppmToX(band.scale, tick) > ISOTOPE_ROOM && (
            <text x={ppmToX(band.scale, tick)} y={band.axisY + 17} className={classes.tick}>
              {tick.toFixed(decimals)}
            </text>
          )}
        </g>
      ))}
      {band.threads
        .filter((thread) => !folded.has(thread.id))
        .map((thread) => (
          <ThreadView
            key={thread.id}
            band={band}
            thread={thread}
            selected={thread.id === selected}
            faded={partners !== null && !partners.has(thread.id)}
            onSelect={() => onSelect(thread.id)}
            onDrag={(event) => onDrag(event, thread)}
            onStep={(change) => onStep(thread, change)}
            onType={() => onType(thread)}
          />
        ))}
      {band.bundles.map((bundle) => (
        <BundleView
          key={bundleKey(bundle.ids)}
          band={band}
          bundle={bundle}
          onOpen={() => onOpen(bundleKey(bundle.ids))}
        />
      ))}
    </g>
  );
}

interface ThreadViewProps {
  band: Band;
  thread: Thread;
  selected: boolean;
  faded: boolean;
  onSelect(): void;
  onDrag(event: PointerEvent): void;
  onStep(change: number): void;
  onType(): void;
}

function ThreadView({ band, thread, selected, faded, onSelect, onDrag, onStep, onType }: ThreadViewProps) {
  const onKeyDown = (event: KeyboardEvent) => {
    const change = shiftStep(event);
    if (change === null && event.key !== 'Enter') return;
    event.preventDefault();
    if (change === null) onType();
    else onStep(change);
  };
  const labelY = band.threadTop - 5 - thread.labelRow * WEAVE.labelRow;
  const nuclei = thread.count > 1 ? `, ${thread.count} nuclei` : '';
  return (
    <g
      className={classes.thread}
      role="slider"
      tabIndex={0}
      aria-label={`Shift of ${thread.id}${nuclei}`}
      aria-valuenow={thread.shift}
      aria-valuemin={band.scale.low}
      aria-valuemax={band.scale.high}
      aria-valuetext={`${thread.shift} ppm`}
      data-selected={selected || undefined}
      data-faded={faded || undefined}
      onFocus={onSelect}
      onKeyDown={onKeyDown}
      onPointerDown={onDrag}
      onDoubleClick={onType}
    >
      <rect x={thread.x - 12} y={labelY - 12} width={24} height={band.axisY - labelY + 12} className={classes.target} />
      <line
        x1={thread.x}
        x2={thread.x}
        y1={labelY + 3}
        y2={band.axisY}
        strokeWidth={thread.thickness}
        className={classes.threadLine}
      />
      <ellipse
        cx={thread.x}
        cy={band.threadTop + WEAVE.threadHeight / 2}
        rx={thread.thickness / 2 + 2.5}
        ry={7}
        className={classes.eye}
      />
      <text x={thread.x} y={labelY} className={classes.label}>
        {thread.id}
      </text>
    </g>
  );
}

function BundleView({ band, bundle, onOpen }: { band: Band; bundle: Bundle; onOpen(): void }) {
  return (
    <g
      className={classes.bundle}
      role="button"
      tabIndex={0}
      aria-label={`Open ${bundle.count} close nuclei: ${bundle.ids.join(', ')}`}
      onClick={onOpen}
      onKeyDown={(event) => {
        if (event.key !== 'Enter' && event.key !== ' ') return;
        event.preventDefault();
        onOpen();
      }}
    >
      <title>{bundle.ids.join(', ')}</title>
      <rect
        x={bundle.x - 12}
        y={band.threadTop - 18}
        width={24}
        height={WEAVE.threadHeight + 18}
        className={classes.target}
      />
      {[-3, 0, 3].map((dx) => (
        <line
          key={dx}
          x1={bundle.x + dx}
          x2={bundle.x + dx}
          y1={band.threadTop}
          y2={band.axisY}
          className={classes.threadLine}
        />
      ))}
      <text x={bundle.x} y={band.threadTop - 5} className={classes.label}>
        {bundle.count} nuclei
      </text>
    </g>
  );
}
