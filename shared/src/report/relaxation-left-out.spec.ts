import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../test/documents.js';
import { relaxationLeftOut } from './relaxation-left-out.js';

describe('relaxation that was not asked for', () => {
  it('compares the widths of tumbling with those given', () => {
    const system = systemOf({
      nuclei: [{ id: 'D', isotope: '2H', shift: 1, lineWidth: 1, quadrupole: { cq: 170e3 } }],
      tumbling: { tauC: 5e-12 },
    });
    const experiment = experimentOf({ observe: '2H' });
    // 3/8 (2 pi CQ)^2 tauC over pi in extreme narrowing (A. Abragam 1961, ch. VIII).
    const width = ((3 / 8) * (2 * Math.PI * 170e3) ** 2 * 5e-12) / Math.PI;
    expect(relaxationLeftOut(system, experiment)!.hz).toBeCloseTo(Math.abs(width - 1), 4);
    expect(relaxationLeftOut(system, { ...experiment, relaxation: 'redfield' })).toBeNull();
  });
});
