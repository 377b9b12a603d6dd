import { useMemo, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react';
import { useElementSize } from '@mantine/hooks';
import type { SpinSystem } from '@heddle/shared';
import { ArcView } from './ArcView';
import { BandView } from './BandView';
import { layoutWeave, type Arc, type Thread } from './logic/layout';
import { xToPpm } from './logic/scale';
import { STEP, tidy } from './logic/steps';
import { ValueEntry, type Entry } from './ValueEntry';
import { WeaveKey } from './WeaveKey';
import classes from './Weave.module.css';

export interface WeaveProps {
  system: SpinSystem;
  /** Range of the observed isotope's axis in ppm, shared with the spectrum below. */
  observed?: { isotope: string; high: number; low: number };
  /** Id of the nucleus in focus: its partners stay, everything else fades. */
  selected: string | null;
  onSelect(id: string | null): void;
  /** `done` is false while a drag goes on, so that one drag is one step to undo. */
  onShift(id: string, ppm: number, done: boolean): void;
  onCoupling(a: string, b: string, j: number, done: boolean): void;
}

/** Handles of all arcs are shown up to this many arcs; beyond it only those of the nucleus in focus. */
const ALL_HANDLES = 8;
/** Pointer travel in px that changes a coupling by one `STEP.j`. */
const PIXELS_PER_STEP = 2;

/** Nuclei as threads at their shifts, couplings as arcs between them: drag, type, or use the keys. */
export function Weave({ system, observed, selected, onSelect, onShift, onCoupling }: WeaveProps) {
  const { ref, width } = useElementSize();
  const [opened, setOpened] = useState<ReadonlySet<string>>(new Set());
  const [entry, setEntry] = useState<Entry | null>(null);
  const drag = useRef<{ move(event: PointerEvent, done: boolean): void } | null>(null);
  const layout = useMemo(
    () => (width > 0 ? layoutWeave(system, { width, observed, opened }) : null),
    [system, width, observed, opened],
  );
  const partners = useMemo(() => partnersOf(selected, layout?.arcs ?? []), [selected, layout]);

  const startDrag = (event: PointerEvent, move: (event: PointerEvent, done: boolean) => void) => {
    event.currentTarget.setPointerCapture(event.pointerId);
    drag.current = { move };
  };
  const dragThread = (event: PointerEvent, thread: Thread) => {
    onSelect(thread.id);
    const band = layout!.bands.find((candidate) => candidate.isotope === thread.isotope)!;
    const grip = event.clientX - thread.x;
    startDrag(event, (at, done) => onShift(thread.id, tidy(+xToPpm(band.scale, at.clientX - grip).toFixed(3)), done));
  };
  const dragArc = (event: PointerEvent, arc: Arc) => {
    const [start, from] = [event.clientY, arc.value ?? 0];
    startDrag(event, (at, done) => {
      const steps = Math.round((start - at.clientY) / PIXELS_PER_STEP);
      onCoupling(arc.a, arc.b, tidy(from + steps * STEP.j * (at.shiftKey ? 0.1 : 1)), done);
    });
  };
  const onPointerMove = (event: PointerEvent) => drag.current?.move(event, false);
  const onPointerUp = (event: PointerEvent) => {
    drag.current?.move(event, true);
    drag.current = null;
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Escape') onSelect(null);
  };

  return (
    <div ref={ref} className={classes.weave} onKeyDown={onKeyDown}>
      {layout && (
        <svg
          width={width}
          height={layout.height}
          role="group"
          aria-label={`Weave of ${system.nuclei.length} nuclei and ${layout.arcs.length} couplings`}
          onPointerMove={onPointerMove}
          onPointerUp={onPointerUp}
        >
          {layout.arcs.map((arc) => (
            <ArcView
              key={arc.key}
              arc={arc}
              faded={selected !== null && arc.a !== selected && arc.b !== selected}
              handle={
                arc.kind === 'scalar' && (layout.arcs.length <= ALL_HANDLES || arc.a === selected || arc.b === selected)
              }
              onDrag={(event) => dragArc(event, arc)}
              onStep={(change) => onCoupling(arc.a, arc.b, tidy((arc.value ?? 0) + change), true)}
              onType={() => setEntry({ kind: 'j', a: arc.a, b: arc.b, ...arc.handle, value: arc.value ?? 0 })}
            />
          ))}
          {layout.bands.map((band) => (
            <BandView
              key={band.isotope}
              band={band}
              width={width}
              selected={selected}
              partners={partners}
              onSelect={onSelect}
              onDrag={dragThread}
              onStep={(thread, change) => onShift(thread.id, tidy(thread.shift + change), true)}
              onType={(thread) =>
                setEntry({ kind: 'shift', id: thread.id, x: thread.x, y: band.threadTop, value: thread.shift })
              }
              onOpen={(key) => setOpened(new Set([...opened, key]))}
            />
          ))}
        </svg>
      )}
      {entry && (
        <ValueEntry
          entry={entry}
          onCommit={(value) => {
            if (entry.kind === 'shift') onShift(entry.id, value, true);
            else onCoupling(entry.a, entry.b, value, true);
          }}
          onClose={() => setEntry(null)}
        />
      )}
      <WeaveKey kinds={new Set(layout?.arcs.map((arc) => arc.kind))} />
    </div>
  );
}

/** The nuclei that share an arc with `id`, itself included; null when nothing is in focus. */
function partnersOf(id: string | null, arcs: readonly Arc[]): ReadonlySet<string> | null {
  if (id === null) return null;
  const partners = new Set([id]);
  for (const arc of arcs) {
    if (arc.a === id) partners.add(arc.b);
    if (arc.b === id) partners.add(arc.a);
  }
  return partners;
}
