const ENDS = Array.from({ length: 33 }, (_, index) => 8 + index * 6);
const PICKS = [
  { y: 66, dye: 'indigo', to: 1 },
  { y: 72, dye: 'woad', to: 1 },
  { y: 78, dye: 'weld', to: 1 },
  { y: 60, dye: 'madder', to: 0.62 },
] as const;

/** A cloth just begun: warp threads with the first few picks woven in. Ornament of empty places. */
export function WarpDrawing() {
  return (
    <svg width={208} height={88} viewBox="0 0 208 88" fill="none" aria-hidden="true">
      {ENDS.map((x) => (
        <path key={x} d={`M${x} 2V86`} stroke="var(--rule)" />
      ))}
      {PICKS.map(({ y, dye, to }, row) =>
        ENDS.slice(0, Math.round(ENDS.length * to)).map((x, index) =>
          // Plain weave: every pick passes over one end and under the next.
          (index + row) % 2 === 0 ? (
            <path
              key={`${dye}${x}`}
              d={`M${x - 4.5} ${y}h9`}
              stroke={`var(--${dye})`}
              strokeWidth={2}
              strokeLinecap="round"
            />
          ) : null,
        ),
      )}
    </svg>
  );
}
