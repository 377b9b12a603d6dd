import type { Spectrum } from '@heddle/shared';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { clampRange, indexAt, panRange, ppmAt, zoomRange } from './axis';
import { columnPlaces, columnTrace } from './columns';
import { drawSvg, spreadLabels, ticks, type Picture } from './drawing';
import { integrate, runningIntegral } from './integrals';
import { readView, START_VIEW, writeView } from './view-state';

/** Lorentzian absorption lines of area `area` (nuclei) at `ppm`, width `lw` Hz, on a 100 MHz isotope: 1 ppm is 100 Hz. */
function lorentzians(lines: { ppm: number; area: number; lw: number }[], points = 20001): Spectrum {
  const [firstPpm, lastPpm] = [10, 0];
  const real = Float64Array.from({ length: points }, (_, i) => {
    const ppm = firstPpm + (i * (lastPpm - firstPpm)) / (points - 1);
    return lines.reduce((sum, line) => {
      const hz = (ppm - line.ppm) * 100;
      return sum + (line.area / Math.PI) * (line.lw / 2 / (hz ** 2 + (line.lw / 2) ** 2));
    }, 0);
  });
  return { firstPpm, lastPpm, real, imag: new Float64Array(points) };
}

describe('zooming and moving', () => {
  const full = { high: 10, low: 0 };
  const inside = fc
    .tuple(fc.double({ min: 0.01, max: 9.99, noNaN: true }), fc.double({ min: 0.1, max: 10, noNaN: true }))
    .map(([at, factor]) => ({ at, factor }));

  it('never leaves the spectrum and keeps the place under the pointer while nothing is clipped', () => {
    expect(zoomRange(full, 2.5, 0.5, full, 0.001)).toEqual({ high: 6.25, low: 1.25 });
    fc.assert(
      fc.property(inside, ({ at, factor }) => {
        const range = zoomRange({ high: 6, low: 4 }, at, factor, full, 0.001);
        expect(range.high).toBeLessThanOrEqual(10 + 1e-12);
        expect(range.low).toBeGreaterThanOrEqual(-1e-12);
        expect(range.high - range.low).toBeCloseTo(Math.min(2 * factor, 10), 9);
      }),
    );
    expect(panRange({ high: 2, low: 1 }, -5, full)).toEqual({ high: 1, low: 0 });
    expect(clampRange({ high: 30, low: 10 }, full)).toEqual(full);
  });

  it('finds the point of a ppm and the ppm of a point', () => {
    const spectrum = lorentzians([], 101);
    expect(ppmAt(spectrum, 25)).toBeCloseTo(7.5, 12);
    expect(indexAt(spectrum, 7.5)).toBeCloseTo(25, 12);
  });
});

describe('a dense trace', () => {
  it('keeps both extremes of each pixel column (found by looking at every sample)', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 200, maxLength: 400 }),
        fc.integer({ min: 10, max: 60 }),
        (list, columns) => {
          const values = Float64Array.from(list);
          const samples = { first: 10, last: 0, values };
          const out = columnTrace(samples, 10, 0, columns);
          for (let column = 0; column < columns; column++) {
            const seen = list.filter((_, i) => {
              const at = (i / (list.length - 1)) * columns;
              return at >= column + 1e-9 && at < column + 1 - 1e-9;
            });
            expect(Math.max(out[2 * column], out[2 * column + 1])).toBeGreaterThanOrEqual(Math.max(...seen));
            expect(Math.min(out[2 * column], out[2 * column + 1])).toBeLessThanOrEqual(Math.min(...seen));
          }
        },
      ),
    );
  });

  it('is the straight line between the samples when there are few', () => {
    const out = columnTrace({ first: 0, last: 10, values: Float64Array.from([0, 10]) }, 0, 10, 20);
    columnPlaces(0, 10, 20).forEach((place, k) => expect(Math.abs(out[k] - place)).toBeLessThanOrEqual(0.25));
    expect(columnTrace({ first: 0, last: 1, values: Float64Array.from([1, 1]) }, 2, 3, 2).every(Number.isNaN)).toBe(
      true,
    );
  });

  it('reads the same from either end', () => {
    const values = Float64Array.from({ length: 997 }, (_, i) => Math.sin(i * i));
    const forward = columnTrace({ first: 10, last: 0, values }, 8.0123, 3.0057, 50);
    const backward = columnTrace({ first: 0, last: 10, values: values.toReversed() }, 8.0123, 3.0057, 50);
    backward.forEach((value, k) => expect(value).toBeCloseTo(forward[k], 9));
  });
});

describe('integrals', () => {
  it('count nuclei: the closed integral of a Lorentzian over a stretch', () => {
    const spectrum = lorentzians([{ ppm: 5, area: 3, lw: 2 }]);
    const closed = (3 / Math.PI) * 2 * Math.atan(100 / 1);
    expect(integrate(spectrum, { high: 6, low: 4 }, 100)).toBeCloseTo(closed, 4);
    const curve = runningIntegral(spectrum, { high: 6, low: 4 }, 100, 51);
    expect(curve[50]).toBeCloseTo(closed, 4);
    expect(curve[25]).toBeCloseTo(closed / 2, 4);
  });

  it('add up when a stretch is cut in two', () => {
    const spectrum = lorentzians(
      [
        { ppm: 3, area: 1, lw: 5 },
        { ppm: 7, area: 2, lw: 5 },
      ],
      501,
    );
    fc.assert(
      fc.property(fc.double({ min: 0, max: 10, noNaN: true }), (cut) => {
        const whole = integrate(spectrum, { high: 10, low: 0 }, 100);
        expect(
          integrate(spectrum, { high: 10, low: cut }, 100) + integrate(spectrum, { high: cut, low: 0 }, 100),
        ).toBeCloseTo(whole, 9);
      }),
    );
  });
});

describe('the address', () => {
  it('says the whole view and is read back', () => {
    const view = {
      ...START_VIEW,
      show: 'fid' as const,
      range: { high: 6.5, low: -1.25 },
      scale: 4,
      panel: 'peaks' as const,
      processing: { exponential: -0.5, zeroFill: 65536, phase0: 12.5 },
      threshold: 0.01,
      integrals: [
        { high: 6, low: 5 },
        { high: 3, low: 2.5 },
      ],
      reference: { index: 1, nuclei: 3 },
    };
    expect(readView(writeView(view))).toEqual(view);
    expect(writeView(START_VIEW).toString()).toBe('');
  });

  it.each(['x=5_6', 'x=a_b', 'y=0', 'y=-1', 'panel=none', 'peaks=2', 'zf=1.5', 'int=,,', 'ref=4:1', 'gb=-2', 'show=x'])(
    'ignores %s',
    (query) => {
      expect(readView(new URLSearchParams(query))).toEqual(START_VIEW);
    },
  );
});

describe('a picture as SVG', () => {
  const picture: Picture = {
    title: 'Vinyl <fragment>',
    range: { high: 7, low: 5 },
    least: 0,
    most: 1,
    traces: [
      {
        label: 'a',
        samples: { first: 10, last: 0, values: lorentzians([{ ppm: 6, area: 1, lw: 1 }]).real },
        colour: '#000',
        dash: [4, 2],
      },
    ],
    peaks: [
      { ppm: 6, height: 1 },
      { ppm: 9, height: 1 },
    ],
    integrals: [{ range: { high: 6.5, low: 5.5 }, curve: Float64Array.from([0, 0.5, 1]), label: '1.00' }],
    lines: [],
    unit: 'ppm',
    colours: { paper: '#fff', ink: '#111', soft: '#555', rule: '#ccc', integral: '#a00' },
  };

  it('is well-formed, escapes what was typed, and shows only the peaks in view', () => {
    const svg = drawSvg(picture, 800, 400);
    const document = new DOMParser().parseFromString(svg, 'image/svg+xml');
    expect(document.querySelector('parsererror')).toBeNull();
    expect(document.querySelector('title')?.textContent).toBe('Vinyl <fragment>');
    expect([...document.querySelectorAll('text')].map((node) => node.textContent)).toContain('6.000');
    expect(svg).not.toContain('9.000');
    expect(document.querySelector('polyline[stroke-dasharray="4 2"]')).not.toBeNull();
  });

  it('has round ticks from high to low', () => {
    expect(ticks({ high: 7.1, low: 5.05 }, 5).values).toEqual([7, 6.5, 6, 5.5]);
    expect(ticks({ high: 0.02, low: -0.02 }, 4)).toEqual({ values: [0.02, 0.01, 0, -0.01, -0.02], decimals: 2 });
  });

  it('keeps labels apart and in order', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 800, noNaN: true }), { minLength: 1, maxLength: 30 }), (list) => {
        const labels = spreadLabels(
          [...list].sort((a, b) => a - b),
          12,
          0,
          800,
        );
        labels.slice(1).forEach((place, i) => expect(place - labels[i]).toBeGreaterThanOrEqual(12 - 1e-9));
        expect(labels.at(-1)).toBeLessThanOrEqual(800 + 1e-9);
      }),
    );
  });
});
