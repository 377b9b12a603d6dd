/**
 * The ways of writing the anisotropy of a shift tensor, all in ppm and as shifts, not shieldings:
 *   span, skew       span = d11 - d33 >= 0, skew = 3 (d22 - iso)/span in -1..1, d11 >= d22 >= d33
 *   delta, eta       dzz - iso and (dyy - dxx)/delta in 0..1 with |dzz-iso| >= |dxx-iso| >= |dyy-iso|
 *                    (U. Haeberlen, Adv. Magn. Reson. Suppl. 1, 1976)
 *   principal values three shifts in any order
 * Names as recommended by R. K. Harris et al., Pure Appl. Chem. 80 (2008) 59.
 */
export interface SpanSkew {
  readonly span: number;
  readonly skew: number;
}

export interface DeltaEta {
  readonly delta: number;
  readonly eta: number;
}

type Three = [number, number, number];

/** Principal values less their mean along x, y, z of Haeberlen's ordering; where two are equally far from the mean, z is d11. */
export function shiftPrincipalAxes({ span, skew }: SpanSkew): Three {
  const [d11, d22, d33] = anisotropicValues({ span, skew });
  return skew > 0 ? [d11, d22, d33] : [d33, d22, d11];
}

/** d11 >= d22 >= d33. */
export function principalFromSpanSkew(iso: number, spanSkew: SpanSkew): Three {
  const [d11, d22, d33] = anisotropicValues(spanSkew);
  return [iso + d11, iso + d22, iso + d33];
}

/** From three principal values in any order. A tensor without anisotropy gets skew 0. */
export function spanSkewFromPrincipal(values: Readonly<Three>): SpanSkew & { iso: number } {
  const [d33, d22, d11] = [...values].sort((a, b) => a - b);
  const iso = (d11 + d22 + d33) / 3;
  const span = d11 - d33;
  return { iso, span, skew: span === 0 ? 0 : clamp((3 * (d22 - iso)) / span, -1, 1) };
}

/** A tensor without anisotropy gets eta 0; skew 0 gives delta > 0. */
export function deltaEtaFromSpanSkew(spanSkew: SpanSkew): DeltaEta {
  const [x, y, z] = shiftPrincipalAxes(spanSkew);
  return { delta: z, eta: z === 0 ? 0 : clamp((y - x) / z, 0, 1) };
}

/** eta = 1 is the tie: delta < 0 names the same values as delta > 0 with x and z exchanged. */
export function spanSkewFromDeltaEta({ delta, eta }: DeltaEta): SpanSkew {
  const { span, skew } = spanSkewFromPrincipal([(-delta * (1 + eta)) / 2, (-delta * (1 - eta)) / 2, delta]);
  return { span, skew };
}

function anisotropicValues({ span, skew }: SpanSkew): Three {
  return [((3 - skew) * span) / 6, (skew * span) / 3, ((-3 - skew) * span) / 6];
}

function clamp(value: number, least: number, most: number): number {
  return Math.min(most, Math.max(least, value));
}
