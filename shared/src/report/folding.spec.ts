import { describe, expect, it } from 'vitest';
import { experimentOf, protonPair } from '../../test/documents.js';
import { folding } from './folding.js';

describe('folding', () => {
  it('counts from the edge of the window to the outermost line', () => {
    const outside = folding(
      protonPair(2000, 10),
      experimentOf({ acquisition: { centre: 5, width: 3900, points: 1024 } }),
    );
    expect(outside.hz).toBeCloseTo(2000 + 5 - 1950, 6);
    expect(outside.detail).toContain('B');
    expect(folding(protonPair(100, 10), experimentOf()).hz).toBe(0);
  });
});
