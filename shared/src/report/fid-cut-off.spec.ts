import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../test/documents.js';
import { fidCutOff, lineWidth } from './fid-cut-off.js';

describe('end of the FID', () => {
  const line = systemOf({ nuclei: [{ id: 'H', isotope: '1H', shift: 5, lineWidth: 2 }] });

  it('has the width of the decay if that ends within the time, and of the sinc function if there is none', () => {
    expect(lineWidth({ lorentzian: 2, gaussian: 0 }, 6)).toBeCloseTo(2, 3);
    expect(lineWidth({ lorentzian: 0, gaussian: 3 }, 4)).toBeCloseTo(3, 3);
    // sin(x)/x = 1/2 at x = 1.895494.
    expect(lineWidth({ lorentzian: 0, gaussian: 0 }, 0.5)).toBeCloseTo(1.895494 / Math.PI / 0.5, 4);
  });

  it('is negligible for a long FID and warns for a short one', () => {
    const long = fidCutOff(line, experimentOf());
    expect(long.hz).toBeLessThan(0.01);
    const short = fidCutOff(line, experimentOf({ acquisition: { centre: 5, width: 4000, points: 1024 } }));
    expect(short.hz).toBeGreaterThan(short.warnAbove);
    expect(short.detail).toContain('20 %'); // exp(-pi 2 0.256) = 0.2
  });
});
