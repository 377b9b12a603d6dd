import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  deltaEtaFromSpanSkew,
  principalFromSpanSkew,
  shiftPrincipalAxes,
  spanSkewFromDeltaEta,
  spanSkewFromPrincipal,
} from './shift-notations.js';

const spanSkew = fc.record({
  span: fc.double({ min: 0.01, max: 1000, noNaN: true }),
  skew: fc.double({ min: -1, max: 1, noNaN: true }),
});

describe('notations of the shift tensor', () => {
  it('puts span and skew into the principal values as defined', () => {
    // R. K. Harris et al., Pure Appl. Chem. 80 (2008) 59: span = d11 - d33, skew = 3 (d22 - iso)/span.
    const [d11, d22, d33] = principalFromSpanSkew(20, { span: 120, skew: 0.5 });
    expect([d11, d22, d33]).toEqual([70, 40, -50]);
    expect(spanSkewFromPrincipal([40, -50, 70])).toEqual({ iso: 20, span: 120, skew: 0.5 });
  });

  it('orders the axes by Haeberlen and gives a tie to d11', () => {
    expect(shiftPrincipalAxes({ span: 120, skew: 0.5 })).toEqual([50, 20, -70]);
    expect(shiftPrincipalAxes({ span: 120, skew: -0.5 })).toEqual([-50, -20, 70]);
    expect(shiftPrincipalAxes({ span: 120, skew: 0 })).toEqual([-60, 0, 60]);
    fc.assert(
      fc.property(spanSkew, (given) => {
        const [x, y, z] = shiftPrincipalAxes(given).map(Math.abs);
        expect(z).toBeGreaterThanOrEqual(x * (1 - 1e-14));
        expect(x).toBeGreaterThanOrEqual(y * (1 - 1e-14));
      }),
    );
  });

  it('sums to zero about the isotropic shift', () => {
    fc.assert(
      fc.property(spanSkew, (given) => {
        const [x, y, z] = shiftPrincipalAxes(given);
        expect(Math.abs(x + y + z)).toBeLessThan(1e-12 * given.span);
      }),
    );
  });

  it('knows the axial tensors: eta = 0, delta = +-2/3 span', () => {
    // Axial about d11 (skew -1) and about d33 (skew +1); from the definitions, iso = (2 perpendicular + parallel)/3.
    expect(deltaEtaFromSpanSkew({ span: 90, skew: -1 })).toEqual({ delta: 60, eta: 0 });
    expect(deltaEtaFromSpanSkew({ span: 90, skew: 1 })).toEqual({ delta: -60, eta: 0 });
  });

  it('goes from each notation to the others and back', () => {
    fc.assert(
      fc.property(spanSkew, fc.double({ min: -200, max: 200, noNaN: true }), ({ span, skew }, iso) => {
        const back = spanSkewFromDeltaEta(deltaEtaFromSpanSkew({ span, skew }));
        expect(back.span).toBeCloseTo(span, 9);
        expect(back.skew).toBeCloseTo(skew, 9);
        const again = spanSkewFromPrincipal(principalFromSpanSkew(iso, { span, skew }));
        expect(again.iso).toBeCloseTo(iso, 9);
        expect(again.span).toBeCloseTo(span, 9);
        expect(Math.abs(again.skew - skew) * span).toBeLessThan(1e-9);
      }),
    );
  });

  it('takes a tensor without anisotropy', () => {
    expect(spanSkewFromPrincipal([5, 5, 5])).toEqual({ iso: 5, span: 0, skew: 0 });
    expect(deltaEtaFromSpanSkew({ span: 0, skew: 0 })).toEqual({ delta: 0, eta: 0 });
  });
});
