import { useComputedColorScheme } from '@mantine/core';
import { DYE_COLOURS, SURFACES, type Dye, type Surfaces } from './dyes';

/** The colours now in force, for drawings that cannot use style sheet variables (canvas, exported pictures). */
export function useDyes(): Surfaces & Record<Dye, string> {
  const scheme = useComputedColorScheme('light');
  return { ...SURFACES[scheme], ...DYE_COLOURS[scheme] };
}
