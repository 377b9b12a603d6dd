import type { ArcKind } from './logic/layout';
import classes from './Weave.module.css';

const WORDS: Record<ArcKind, string> = {
  scalar: 'J, weight by size; hollow eye below zero',
  dipolar: 'dipolar',
  exchange: 'exchange',
};

/** Says what the textures mean, for the kinds that occur. */
export function WeaveKey({ kinds }: { kinds: ReadonlySet<ArcKind> }) {
  if (kinds.size === 0) return null;
  return (
    <p className={classes.key}>
      {(Object.keys(WORDS) as ArcKind[])
        .filter((kind) => kinds.has(kind))
        .map((kind) => (
          <span key={kind}>
            <svg width={28} height={8} aria-hidden>
              <g className={classes.arc} data-kind={kind}>
                <path d="M2 4H26" className={classes.arcLine} strokeWidth={3} />
                {kind === 'exchange' && <path d="M2 4H26" className={classes.arcCore} strokeWidth={1} />}
              </g>
            </svg>
            {WORDS[kind]}
          </span>
        ))}
    </p>
  );
}
