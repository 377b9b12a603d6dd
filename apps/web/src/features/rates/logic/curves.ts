import { relaxationTable, type Frame, type SpinSystem } from '@heddle/shared';

/** T1 and T2 of one nucleus along correlation time or field. */
export interface RateCurve {
  /** tauC in s, or 1H frequency in MHz. */
  readonly x: number;
  readonly t1: number | null;
  readonly t2: number | null;
}

export type Along = 'tauC' | 'field';

const TAU = { first: 1e-12, last: 1e-6, points: 61 };
const FIELD = { first: 20, last: 1200, points: 41 };

/** Points evenly spread in the logarithm. */
function logSpread({ first, last, points }: { first: number; last: number; points: number }): number[] {
  return Array.from({ length: points }, (_, i) => first * (last / first) ** (i / (points - 1)));
}

/** T1 and T2 of the nucleus `id` over the range that matters to NMR, in seconds. Needs `tumbling`. */
export function rateCurve(system: SpinSystem, frame: Frame, id: string, along: Along): RateCurve[] {
  const xs = logSpread(along === 'tauC' ? TAU : FIELD);
  const [tauCs, fields] = along === 'tauC' ? [xs, [frame.protonMHz]] : [[system.tumbling!.tauC], xs];
  return relaxationTable(system, frame, tauCs, fields).map(({ nuclei }, i) => {
    const nucleus = nuclei.find((one) => one.id === id);
    return { x: xs[i], t1: nucleus?.t1 ?? null, t2: nucleus?.t2 ?? null };
  });
}

/** The decades that hold all values, as exponents of ten; null when there is none. */
export function decades(values: readonly (number | null)[]): { low: number; high: number } | null {
  const known = values.filter((value): value is number => value !== null && value > 0).map(Math.log10);
  if (known.length === 0) return null;
  return {
    low: Math.floor(Math.min(...known)),
    high: Math.max(Math.ceil(Math.max(...known)), Math.floor(Math.min(...known)) + 1),
  };
}

/** What keeps the numbers from being known, in a sentence; null when nothing does. */
export function missing(system: SpinSystem): string | null {
  if (!system.tumbling) return 'Type the correlation time of tumbling under Notes.';
  const dipolar = system.couplings.some((coupling) => coupling.dipolar !== undefined);
  const local = system.nuclei.some(({ csa, quadrupole }) => csa !== undefined || quadrupole !== undefined);
  if (!dipolar && !local) return 'Nothing relaxes these nuclei: give positions with dipolar couplings, or tensors.';
  return null;
}

/** A time in s, ms or µs with three digits. */
export function timeWords(seconds: number | null): string {
  if (seconds === null) return '\u2013';
  const [factor, unit] = seconds >= 1 ? [1, 's'] : seconds >= 1e-3 ? [1e3, 'ms'] : [1e6, '\u00b5s'];
  return `${+(seconds * factor).toPrecision(3)} ${unit}`;
}
