/**
 * The colours of Heddle: wool and ink for surfaces and words, four plant dyes for data.
 *
 * Every dye stands at least 3:1 against the surfaces of its scheme (lines), every word colour at least 4.5:1, and any two
 * dyes stay apart for protan, deutan and tritan eyes; `dyes.spec.ts` computes all of it. In grey print weld and woad
 * come close, so a trace also carries a dash pattern.
 */
export type Scheme = 'light' | 'dark';

export const DYES = ['indigo', 'madder', 'weld', 'woad'] as const;
export type Dye = (typeof DYES)[number];

export const DYE_COLOURS: Record<Scheme, Record<Dye, string>> = {
  light: { indigo: '#27357a', madder: '#a8322a', weld: '#a37c00', woad: '#2a7f98' },
  dark: { indigo: '#8c9bf0', madder: '#e9695b', weld: '#e8cb5a', woad: '#7fd0de' },
};

export interface Surfaces {
  /** The page. */
  wool: string;
  /** What lies on the page: inputs, menus, plots. */
  fleece: string;
  /** A quiet fill: hovered rows, skeletons. */
  felt: string;
  /** Words. */
  ink: string;
  /** Secondary words. */
  inkSoft: string;
  /** Borders of inputs and other things that are worked with, at least 3:1. */
  edge: string;
  /** Fine rules that only ornament. */
  rule: string;
}

export const SURFACES: Record<Scheme, Surfaces> = {
  light: {
    wool: '#efebe1',
    fleece: '#f9f7f1',
    felt: '#e5dfd1',
    ink: '#1b1f2a',
    inkSoft: '#575449',
    edge: '#847f70',
    rule: '#cfc7b5',
  },
  dark: {
    wool: '#15181f',
    fleece: '#1d212b',
    felt: '#282d39',
    ink: '#e9e4d8',
    inkSoft: '#aba799',
    edge: '#787c89',
    rule: '#363c4a',
  },
};

export interface TraceStyle {
  dye: Dye;
  /** Canvas and SVG dash pattern in pixels; empty is solid. */
  dash: readonly number[];
}

const DASHES: readonly (readonly number[])[] = [[], [7, 3], [2, 3], [9, 3, 2, 3]];

/** Dye and dash of the trace with number `index`: sixteen differ before the first comes again. */
export function traceStyle(index: number): TraceStyle {
  const dye = DYES[index % DYES.length] ?? 'indigo';
  return { dye, dash: DASHES[Math.floor(index / DYES.length) % DASHES.length] ?? [] };
}
