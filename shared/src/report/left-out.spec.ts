import { describe, expect, it } from 'vitest';
import { experimentOf, protonPair } from '../../test/documents.js';
import { whatIsLeftOut } from './left-out.js';

describe('whatIsLeftOut', () => {
  it('gives every entry a number, a threshold and a sentence', () => {
    const entries = whatIsLeftOut(protonPair(100, 10), experimentOf());
    expect(entries.map(({ id }) => id)).toEqual([
      'first-order-reading',
      'high-field-truncation',
      'ideal-pulses',
      'fid-cut-off',
      'folding',
    ]);
    for (const { hz, warnAbove, detail, title } of entries) {
      expect(Number.isFinite(hz) && hz >= 0 && warnAbove >= 0).toBe(true);
      expect(detail.length > 20 && title.length > 3).toBe(true);
    }
  });

  it('takes the fields of a spectrometer in place of common ones', () => {
    const limit = (nutation?: number) =>
      whatIsLeftOut(protonPair(100, 10), experimentOf(), { nutation }).find(({ id }) => id === 'ideal-pulses')!
        .warnAbove;
    expect(limit(50e3)).toBe(2 * limit());
  });
});
