import type { KeyboardEvent, PointerEvent } from 'react';
import type { Arc } from './logic/layout';
import { couplingStep } from './logic/steps';
import classes from './Weave.module.css';

interface ArcViewProps {
  arc: Arc;
  faded: boolean;
  handle: boolean;
  onDrag(event: PointerEvent): void;
  onStep(change: number): void;
  onType(): void;
}

const KIND_WORDS = { scalar: 'J', dipolar: 'dipolar coupling', exchange: 'exchange' } as const;
const UNITS = { scalar: 'Hz', dipolar: 'Hz', exchange: 'per second' } as const;

/** One joined pair: weight by size, texture by kind, and for J a handle to drag, step or type. */
export function ArcView({ arc, faded, handle, onDrag, onStep, onType }: ArcViewProps) {
  const value = arc.value === null ? 'from positions' : `${arc.value} ${UNITS[arc.kind]}`;
  const title = `${KIND_WORDS[arc.kind]} ${arc.a} and ${arc.b}: ${value}`;
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter') onType();
    const change = couplingStep(event);
    if (change === null && event.key !== 'Enter') return;
    event.preventDefault();
    if (change !== null) onStep(change);
  };
  return (
    <g
      className={classes.arc}
      data-kind={arc.kind}
      data-faded={faded || undefined}
      data-negative={(arc.value ?? 0) < 0 || undefined}
    >
      <path d={arc.path} className={classes.arcLine} strokeWidth={arc.thickness}>
        <title>{title}</title>
      </path>
      {arc.kind === 'exchange' && (
        <path d={arc.path} className={classes.arcCore} strokeWidth={Math.max(1, arc.thickness - 2)} />
      )}
      {handle && (
        <g
          className={classes.handle}
          role="slider"
          tabIndex={0}
          aria-label={`J of ${arc.a} and ${arc.b}`}
          aria-orientation="vertical"
          aria-valuenow={arc.value ?? 0}
          aria-valuetext={`${arc.value ?? 0} hertz`}
          onKeyDown={onKeyDown}
          onPointerDown={onDrag}
          onDoubleClick={onType}
        >
          <rect x={arc.handle.x - 12} y={arc.handle.y - 12} width={24} height={24} className={classes.target} />
          <circle cx={arc.handle.x} cy={arc.handle.y} r={4.5} className={classes.eye} />
          <text x={arc.handle.x} y={arc.handle.y - 8} className={classes.arcLabel}>
            {arc.value}
          </text>
        </g>
      )}
    </g>
  );
}
