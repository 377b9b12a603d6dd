import type { Step } from '@heddle/shared';
import { layoutSequence } from './logic/diagram';
import classes from './PulseDiagram.module.css';

/** A sequence as chemists draw it: one thread an isotope, pulses as bars, the signal at the end of the observed one. */
export function PulseDiagram({ steps, observe }: { steps: readonly Step[]; observe: string }) {
  const { channels, marks, width, height, words } = layoutSequence(steps, observe);
  return (
    <figure className={classes.figure}>
      <svg viewBox={`0 0 ${width} ${height}`} width="100%" style={{ maxWidth: width }} role="img" aria-label={words}>
        {channels.map(({ isotope, y }) => (
          <g key={isotope}>
            <text x={0} y={y - 4} className={classes.channel}>
              {isotope}
            </text>
            <line x1={34} x2={width} y1={y} y2={y} className={classes.thread} />
          </g>
        ))}
        {marks.map((mark, i) => {
          if (mark.kind === 'bar') {
            return (
              <g key={i}>
                <rect
                  x={mark.x}
                  y={mark.y - mark.height}
                  width={mark.width}
                  height={mark.height}
                  className={mark.soft ? classes.soft : classes.bar}
                />
                <text x={mark.x + mark.width / 2} y={mark.y - mark.height - 4} className={classes.label}>
                  {mark.label}
                </text>
              </g>
            );
          }
          if (mark.kind === 'signal') return <path key={i} d={mark.path} className={classes.signal} />;
          return (
            <text key={i} x={mark.x} y={mark.y} className={classes.delay}>
              {mark.label}
            </text>
          );
        })}
      </svg>
    </figure>
  );
}
