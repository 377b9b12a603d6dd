import { DYES } from '../../theme/dyes';

const PITCH = 26;
/** Height of the eyes as a share of the drawing, repeating across the warp: a twill draft on four shafts. */
const SHAFTS = [0.34, 0.42, 0.5, 0.58] as const;
const HEIGHT = 1000;

/** A warp drawn through four shafts of heddles; every dyed end sits where the draft repeats. */
export function Threads() {
  const ends = Array.from({ length: 48 }, (_, index) => index);
  return (
    <svg viewBox={`0 0 ${PITCH * 30} ${HEIGHT}`} preserveAspectRatio="xMinYMid slice" fill="none" aria-hidden="true">
      {ends.map((index) => {
        const x = PITCH * (index + 0.5);
        const y = HEIGHT * (SHAFTS[index % SHAFTS.length] ?? 0.5);
        const dye = index % 5 === 2 ? DYES[Math.floor(index / 5) % DYES.length] : undefined;
        const colour = dye ? `var(--${dye})` : 'var(--edge)';
        return (
          <g key={index} stroke={colour} strokeWidth={dye ? 2 : 1}>
            <path d={`M${x} 0V${y - 22}M${x} ${y + 22}V${HEIGHT}`} />
            <path d={`M${x} ${y - 22}c11 14 11 30 0 44c-11-14-11-30 0-44z`} strokeWidth={1.2} />
            <circle cx={x} cy={y} r={dye ? 4 : 2.2} fill={colour} stroke="none" />
          </g>
        );
      })}
    </svg>
  );
}
