const EYES = [
  { x: 5, y: 12.5, dye: 'indigo' },
  { x: 12.3, y: 18.5, dye: 'madder' },
  { x: 19.7, y: 12.5, dye: 'weld' },
  { x: 27, y: 18.5, dye: 'woad' },
] as const;

/** The mark: four threads passing through the eyes of a heddle, two raised and two lowered. */
export function Mark({ size = 28 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 32 32" fill="none" aria-hidden="true">
      {EYES.map(({ x, y, dye }) => (
        <g key={dye}>
          <path
            d={`M${x} 2V${y - 5}M${x} ${y + 5}V30M${x} ${y - 5}c3.2 3.3 3.2 6.7 0 10c-3.2-3.3-3.2-6.7 0-10z`}
            stroke="var(--ink)"
            strokeWidth={1.6}
            strokeLinecap="round"
          />
          <circle cx={x} cy={y} r={1.7} fill={`var(--${dye})`} />
        </g>
      ))}
    </svg>
  );
}
