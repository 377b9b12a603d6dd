import type { Approximation } from '@heddle/shared';

/** Whether an approximation that was made is too large to trust the picture. */
export function isDoubtful({ made, hz, warnAbove }: Approximation): boolean {
  return made && hz > warnAbove;
}

/** Doubtful ones first, then by size. */
export function ordered(entries: readonly Approximation[]): Approximation[] {
  return [...entries].sort((a, b) => Number(isDoubtful(b)) - Number(isDoubtful(a)) || b.hz - a.hz);
}

/** A size in Hz with a sensible number of digits. */
export function inHertz(hz: number): string {
  if (hz === 0) return '0 Hz';
  if (hz < 1e-3) return 'under 0.001 Hz';
  if (hz >= 1e6) return `${+(hz / 1e6).toPrecision(3)} MHz`;
  if (hz >= 1e4) return `${+(hz / 1e3).toPrecision(3)} kHz`;
  return `${+hz.toPrecision(3)} Hz`;
}
