import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import { referenceCases } from '../../../test/reference/catalogue.js';
import { larmorMHz } from '../../nuclides/nuclides.js';
import { landmarksOf } from './landmarks.js';

const acquisition = { centre: 100, width: 40_000, points: 64 };

describe('landmarksOf', () => {
  const carbon = systemOf({
    nuclei: [{ id: 'C', isotope: '13C', shift: 120, csa: { span: 90, skew: 0.2, euler: [10, 20, 30] } }],
  });

  it('marks the principal values of a static shift tensor', () => {
    const marks = landmarksOf(
      carbon,
      experimentOf({ observe: '13C', sample: { kind: 'powder', orientations: 9 }, acquisition }),
    );
    expect(marks[0]).toMatchObject({ kind: 'isotropic', nucleus: 'C' });
    expect(marks[0].ppm).toBeCloseTo(120, 9);
    // d22 = iso + skew span/3, d11 and d33 from d11 - d33 = span and the mean.
    const edges = marks.slice(1).map(({ ppm }) => ppm);
    [72, 126, 162].forEach((ppm, k) => expect(edges[k]).toBeCloseTo(ppm, 9));
  });

  it('numbers the sidebands within the window', () => {
    const sample = { kind: 'spinning', rateHz: 6000, orientations: 9 } as const;
    const marks = landmarksOf(carbon, experimentOf({ observe: '13C', sample, acquisition }));
    // 120 ppm is 2012 Hz from the centre at 100.58 MHz: orders -3 .. 2 lie within 20 kHz of it.
    expect(marks.map(({ order }) => order)).toEqual([undefined, -3, -2, -1, 1, 2]);
    const [centre, , second] = marks;
    expect((second.ppm - centre.ppm) * larmorMHz('13C', 400)).toBeCloseTo(-12_000, 6);
  });

  it('puts the isotropic mark of a quadrupolar nucleus where its second-order shift puts it', () => {
    type Inputs = { I: number; CQ_Hz: number; eta: number; nu0_Hz: number };
    const [{ inputs, expected, tolerance }] = referenceCases<Inputs, { isotropic_shift_Hz: number }>('E09');
    const sodium = systemOf({
      nuclei: [{ id: 'Na', isotope: '23Na', shift: 0, quadrupole: { cq: inputs.CQ_Hz, eta: inputs.eta } }],
    });
    const protonMHz = inputs.nu0_Hz / 1e6 / larmorMHz('23Na', 1);
    const experiment = experimentOf({
      protonMHz,
      observe: '23Na',
      sample: { kind: 'powder', orientations: 9 },
      acquisition: { centre: 0, width: 40_000, points: 64 },
    });
    // The satellites have 0.3 of the intensity each, the central transition 0.4.
    const [mark] = landmarksOf(sodium, experiment, 0.35);
    expect(Math.abs((mark.ppm * inputs.nu0_Hz) / 1e6 / expected.isotropic_shift_Hz - 1)).toBeLessThan(tolerance.rel);
  });
});
