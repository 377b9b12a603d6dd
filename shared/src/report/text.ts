/** A frequency to three figures, in the unit that suits it. */
export function hertz(value: number): string {
  const size = Math.abs(value);
  if (size >= 1e6) return `${+(value / 1e6).toPrecision(3)} MHz`;
  if (size >= 1e3) return `${+(value / 1e3).toPrecision(3)} kHz`;
  return `${+value.toPrecision(3)} Hz`;
}

export function percent(fraction: number): string {
  return `${+(100 * fraction).toPrecision(2)} %`;
}
