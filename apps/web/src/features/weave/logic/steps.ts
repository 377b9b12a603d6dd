/** How far one key press or one pixel moves a value; Shift is ten times finer, PageUp and PageDown ten times coarser. */
export const STEP = { shift: 0.01, j: 0.1 } as const;

export interface Stroke {
  key: string;
  shiftKey: boolean;
}

/** Change of a shift in ppm for a key: the axis falls to the right, so ArrowLeft raises the shift. Null: not a moving key. */
export function shiftStep({ key, shiftKey }: Stroke): number | null {
  const fine = shiftKey ? 0.1 : 1;
  switch (key) {
    case 'ArrowLeft':
      return STEP.shift * fine;
    case 'ArrowRight':
      return -STEP.shift * fine;
    case 'PageUp':
      return STEP.shift * 10;
    case 'PageDown':
      return -STEP.shift * 10;
    default:
      return null;
  }
}

/** Change of a coupling in Hz for a key. Null: not a moving key. */
export function couplingStep({ key, shiftKey }: Stroke): number | null {
  const fine = shiftKey ? 0.1 : 1;
  switch (key) {
    case 'ArrowUp':
      return STEP.j * fine;
    case 'ArrowDown':
      return -STEP.j * fine;
    case 'PageUp':
      return STEP.j * 10;
    case 'PageDown':
      return -STEP.j * 10;
    default:
      return null;
  }
}

/** Rounds to the fifth decimal, finer than any entry, so that repeated steps leave no dust like 4.1000000000000005. */
export function tidy(value: number): number {
  return Math.round(value * 1e5) / 1e5 + 0;
}
