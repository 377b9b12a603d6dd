import { useElementSize } from '@mantine/hooks';
import { traceStyle } from '../../theme/dyes';
import { useDyes } from '../../theme/useDyes';
import { decades, timeWords, type Along, type RateCurve } from './logic/curves';

const HEIGHT = 256;
const LEFT = 58;
const BOTTOM = 40;
const TOP = 28;

/** T1 and T2 on logarithmic axes, with a rule at the value in force. */
export function RatePlot({
  curve,
  along,
  now,
  nucleus,
}: {
  curve: readonly RateCurve[];
  along: Along;
  now: number;
  nucleus: string;
}) {
  const { ref, width } = useElementSize();
  const dyes = useDyes();
  const times = decades(curve.flatMap(({ t1, t2 }) => [t1, t2]));
  if (!times) return null;
  const [first, last] = [Math.log10(curve[0].x), Math.log10(curve[curve.length - 1].x)];
  const plot = { width: Math.max(80, width - LEFT - 12), height: HEIGHT - BOTTOM - TOP };
  const x = (value: number) => LEFT + ((Math.log10(value) - first) / (last - first)) * plot.width;
  const y = (value: number) => TOP + ((times.high - Math.log10(value)) / (times.high - times.low)) * plot.height;
  const path = (key: 't1' | 't2') =>
    curve
      .flatMap((point) => (point[key] === null ? [] : [`${x(point.x).toFixed(1)} ${y(point[key]).toFixed(1)}`]))
      .join('L');
  const decadesUp = Array.from({ length: times.high - times.low + 1 }, (_, i) => times.low + i);
  const marks =
    along === 'tauC' ? [-12, -11, -10, -9, -8, -7, -6].map((power) => 10 ** power) : [20, 60, 100, 200, 400, 800, 1200];
  const ruled = now >= curve[0].x && now <= curve[curve.length - 1].x;
  return (
    <div ref={ref}>
      <svg
        width="100%"
        height={HEIGHT}
        role="img"
        aria-label={`T1 and T2 of ${nucleus} along ${along === 'tauC' ? 'correlation time' : '1H frequency'}`}
        fontSize={11}
        fill={dyes.ink}
      >
        {decadesUp.map((power) => (
          <g key={power}>
            <line x1={LEFT} x2={LEFT + plot.width} y1={y(10 ** power)} y2={y(10 ** power)} stroke={dyes.rule} />
            <text x={LEFT - 6} y={y(10 ** power) + 4} textAnchor="end">
              {timeWords(10 ** power)}
            </text>
          </g>
        ))}
        {marks.map((value) => (
          <text key={value} x={x(value)} y={HEIGHT - BOTTOM + 16} textAnchor="middle">
            {along === 'tauC' ? value.toExponential(0) : value}
          </text>
        ))}
        <text x={LEFT + plot.width} y={HEIGHT - 6} textAnchor="end" fill={dyes.inkSoft}>
          {along === 'tauC' ? 'correlation time, s' : '1H frequency, MHz'}
        </text>
        {ruled && (
          <line x1={x(now)} x2={x(now)} y1={TOP} y2={TOP + plot.height} stroke={dyes.inkSoft} strokeDasharray="2 3" />
        )}
        {(['t1', 't2'] as const).map((key, i) => (
          <path
            key={key}
            d={`M${path(key)}`}
            fill="none"
            stroke={dyes[traceStyle(i).dye]}
            strokeWidth={1.75}
            strokeDasharray={i === 1 ? '7 3' : undefined}
          />
        ))}
        {(['T1', 'T2'] as const).map((name, i) => (
          <g key={name}>
            <line
              x1={LEFT + 70 * i}
              x2={LEFT + 24 + 70 * i}
              y1={12}
              y2={12}
              stroke={dyes[traceStyle(i).dye]}
              strokeWidth={1.75}
              strokeDasharray={i === 1 ? '7 3' : undefined}
            />
            <text x={LEFT + 30 + 70 * i} y={16}>
              {name}
            </text>
          </g>
        ))}
      </svg>
    </div>
  );
}
