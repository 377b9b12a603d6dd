import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { axisTicks, ppmToX, xToPpm } from './scale';
import { couplingStep, shiftStep, tidy } from './steps';

describe('keys of the weave', () => {
  it('raises a shift to the left, where the axis rises', () => {
    expect(shiftStep({ key: 'ArrowLeft', shiftKey: false })).toBeGreaterThan(0);
    expect(shiftStep({ key: 'ArrowRight', shiftKey: true })).toBeCloseTo(-0.001, 12);
  });

  it('leaves other keys to the page', () => {
    expect(shiftStep({ key: 'Tab', shiftKey: false })).toBeNull();
    expect(couplingStep({ key: 'ArrowLeft', shiftKey: false })).toBeNull();
  });

  it('leaves no binary dust after many steps', () => {
    let value = 4;
    for (let i = 0; i < 1000; i++) value = tidy(value + couplingStep({ key: 'ArrowUp', shiftKey: true })!);
    expect(value).toBe(14);
  });
});

describe('ppm axis', () => {
  it('maps to pixels and back', () => {
    fc.assert(
      fc.property(fc.double({ min: -50, max: 50, noNaN: true }), (ppm) => {
        const scale = { high: 12, low: -1, left: 28, width: 700 };
        expect(xToPpm(scale, ppmToX(scale, ppm))).toBeCloseTo(ppm, 9);
      }),
    );
  });

  it('ticks at round values inside the range', () => {
    expect(axisTicks(6.1, 3.9, 5)).toEqual([6, 5.5, 5, 4.5, 4]);
  });
});
