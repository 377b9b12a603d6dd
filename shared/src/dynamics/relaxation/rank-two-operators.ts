import type { Mechanism } from './mechanisms.js';

/** An operator of one spin with one element a column: it takes |m> to `elements[I - m]` |m + order>. Real in the Zeeman basis. */
export interface LadderOperator {
  readonly order: number;
  readonly elements: Float64Array;
}

/** A part of a rank-2 spin operator T_q: the product of `first` (of the mechanism's spin a) and `second` (of its spin b). */
export interface OperatorPart {
  readonly first: LadderOperator;
  readonly second?: LadderOperator;
}

/**
 * The spin operators T_2q, q = -2..2, of a mechanism, split into products of ladder operators, so that H = sum over q of
 * (-1)^q A_q T_-q with A_0 = sqrt(3/2) Tzz of its tensor T in the laboratory frame:
 *   dipolar       T_0 = (3 Iz Sz - I.S)/sqrt 6, T_+-1 = -+(I+- Sz + Iz S+-)/2, T_+-2 = I+- S+-/2
 *   quadrupolar   the same with S = I
 *   shift         the same with S the unit vector of the field: T_0 = 2 Iz/sqrt 6, T_+-1 = -+I+-/2, no T_+-2
 * (M. Mehring, Principles of High Resolution NMR in Solids, 1983, ch. 2).
 */
export function rankTwoParts(kind: Mechanism['kind'], spinA: number, spinB: number): OperatorPart[] {
  const a = ladderOperators(spinA);
  if (kind === 'shift') {
    return [a.z, a.plus, a.minus].map((operator) => ({
      first: scaled(operator, operator.order === 0 ? 2 / Math.sqrt(6) : -operator.order / 2),
    }));
  }
  if (kind === 'quadrupolar') return quadrupolarParts(spinA);
  const b = ladderOperators(spinB);
  const product = (first: LadderOperator, second: LadderOperator, factor: number) => ({
    first: scaled(first, factor),
    second,
  });
  return [
    product(a.z, b.z, 2 / Math.sqrt(6)),
    product(a.plus, b.minus, -0.5 / Math.sqrt(6)),
    product(a.minus, b.plus, -0.5 / Math.sqrt(6)),
    product(a.plus, b.z, -0.5),
    product(a.z, b.plus, -0.5),
    product(a.minus, b.z, 0.5),
    product(a.z, b.minus, 0.5),
    product(a.plus, b.plus, 0.5),
    product(a.minus, b.minus, 0.5),
  ];
}

function quadrupolarParts(spin: number): OperatorPart[] {
  const { z, plus, minus } = ladderOperators(spin);
  const squares = z.elements.map((m) => (3 * m * m - spin * (spin + 1)) / Math.sqrt(6));
  const parts: LadderOperator[] = [{ order: 0, elements: squares }];
  for (const ladder of [plus, minus]) {
    const { order } = ladder;
    const single = ladder.elements.map((element, k) => (-order / 2) * element * (2 * z.elements[k] + order));
    const double = ladder.elements.map((element, k) => (element * (ladder.elements[k - order] ?? 0)) / 2);
    parts.push({ order, elements: single }, { order: 2 * order, elements: double });
  }
  return parts.map((first) => ({ first }));
}

/** Iz, I+ and I- of one spin, by column from m = I down. */
export function ladderOperators(spin: number): Record<'z' | 'plus' | 'minus', LadderOperator> {
  const levels = Float64Array.from({ length: 2 * spin + 1 }, (_, k) => spin - k);
  const ladder = (order: 1 | -1) => ({
    order,
    elements: levels.map((m) => Math.sqrt(spin * (spin + 1) - m * (m + order))),
  });
  return { z: { order: 0, elements: levels }, plus: ladder(1), minus: ladder(-1) };
}

function scaled({ order, elements }: LadderOperator, factor: number): LadderOperator {
  return { order, elements: elements.map((element) => factor * element) };
}
