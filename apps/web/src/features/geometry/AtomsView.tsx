import { useId, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react';
import type { DipolarPair } from '@heddle/shared';
import { traceStyle } from '../../theme/dyes';
import { useDyes } from '../../theme/useDyes';
import { project } from './logic/view';

interface Atom {
  id: string;
  isotope: string;
  position?: readonly number[];
}

const SIZE = 260;
const TURN = 0.15;

/** The chosen atoms in space, with the pairs within the cut-off; drag or arrow keys turn them. */
export function AtomsView({ atoms, pairs }: { atoms: readonly Atom[]; pairs: readonly DipolarPair[] }) {
  const dyes = useDyes();
  const hint = useId();
  const [{ yaw, pitch }, setTurn] = useState({ yaw: 0.5, pitch: 0.3 });
  const grip = useRef<{ x: number; y: number; yaw: number; pitch: number } | null>(null);
  const places = project(
    atoms.map(({ position }) => position ?? [0, 0, 0]),
    yaw,
    pitch,
    SIZE,
  );
  const isotopes = [...new Set(atoms.map(({ isotope }) => isotope))];
  const index = new Map(atoms.map(({ id }, i) => [id, i]));
  const onKeyDown = (event: KeyboardEvent) => {
    const turns: Record<string, [number, number]> = {
      ArrowLeft: [-TURN, 0],
      ArrowRight: [TURN, 0],
      ArrowUp: [0, -TURN],
      ArrowDown: [0, TURN],
    };
    const turn = turns[event.key];
    if (!turn) return;
    event.preventDefault();
    setTurn({ yaw: yaw + turn[0], pitch: pitch + turn[1] });
  };
  const onPointerMove = ({ clientX, clientY }: PointerEvent) => {
    const from = grip.current;
    if (from) setTurn({ yaw: from.yaw + (clientX - from.x) / 80, pitch: from.pitch + (clientY - from.y) / 80 });
  };
  return (
    <>
      <svg
        width={SIZE}
        height={SIZE}
        role="application"
        aria-roledescription="structure"
        aria-label={`${atoms.length} nuclei in space`}
        aria-describedby={hint}
        tabIndex={0}
        style={{ background: 'var(--fleece)', border: '1px solid var(--rule)', touchAction: 'none', cursor: 'grab' }}
        onKeyDown={onKeyDown}
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          grip.current = { x: event.clientX, y: event.clientY, yaw, pitch };
        }}
        onPointerMove={onPointerMove}
        onPointerUp={() => (grip.current = null)}
      >
        {pairs.slice(0, 200).map(({ between: [a, b] }) => {
          const [from, to] = [places[index.get(a)!], places[index.get(b)!]];
          return (
            <line
              key={`${a},${b}`}
              x1={from.x}
              y1={from.y}
              x2={to.x}
              y2={to.y}
              stroke={dyes.woad}
              strokeDasharray="3 3"
            />
          );
        })}
        {[...atoms.keys()]
          .sort((i, k) => places[i].depth - places[k].depth)
          .map((i) => (
            <g key={atoms[i].id}>
              <circle
                cx={places[i].x}
                cy={places[i].y}
                r={6}
                fill={dyes[traceStyle(isotopes.indexOf(atoms[i].isotope)).dye]}
              />
              {atoms.length <= 40 && (
                <text x={places[i].x + 8} y={places[i].y + 4} fontSize={11} fill={dyes.ink}>
                  {atoms[i].id}
                </text>
              )}
            </g>
          ))}
      </svg>
      <span id={hint} hidden>
        Arrow keys turn the structure.
      </span>
    </>
  );
}
