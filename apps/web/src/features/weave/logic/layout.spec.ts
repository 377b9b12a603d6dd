import { parseSystem, type SpinSystem } from '@heddle/shared';
import { describe, expect, it } from 'vitest';
import { bundleKey, layoutWeave, WEAVE, type WeaveLayout } from './layout';

function systemOf(nuclei: object[], more: object = {}): SpinSystem {
  return parseSystem({ format: 'heddle.spin-system/1', name: 'woven', nuclei, ...more });
}

function layoutOf(system: SpinSystem, opened = new Set<string>()): WeaveLayout {
  return layoutWeave(system, { width: 800, opened });
}

const pair = systemOf(
  [
    { id: 'Ha', isotope: '1H', shift: 6 },
    { id: 'Hb', isotope: '1H', shift: 5, count: 3 },
    { id: 'C', isotope: '13C', shift: 120 },
  ],
  {
    couplings: [
      { between: ['Ha', 'Hb'], j: -9 },
      { between: ['Ha', 'C'], j: 160 },
    ],
  },
);

describe('layout of the weave', () => {
  it('makes one band an isotope and puts the observed one next to the spectrum', () => {
    const layout = layoutWeave(pair, { width: 800, opened: new Set(), observed: { isotope: '1H', high: 7, low: 4 } });
    expect(layout.bands.map((band) => band.isotope)).toEqual(['13C', '1H']);
    expect(layout.bands[1].top).toBeGreaterThan(layout.bands[0].bottom);
  });

  it('draws high shifts to the left and thick threads for groups', () => {
    const [ha, hb] = layoutOf(pair).bands.find((band) => band.isotope === '1H')!.threads;
    expect([ha.id, hb.id]).toEqual(['Ha', 'Hb']);
    expect(ha.x).toBeLessThan(hb.x);
    expect(hb.thickness).toBeGreaterThan(ha.thickness);
  });

  it('starts and ends each arc at its two threads', () => {
    const layout = layoutOf(pair);
    const x = new Map(layout.bands.flatMap((band) => band.threads.map((thread) => [thread.id, thread.x])));
    for (const arc of layout.arcs) {
      const numbers = arc.path.match(/-?[\d.]+/g)!.map(Number);
      expect([numbers[0], numbers.at(-2)].sort()).toEqual([x.get(arc.a), x.get(arc.b)].sort());
    }
  });

  it('gives the larger coupling the heavier arc whatever its sign', () => {
    const [small, large] = layoutOf(pair).arcs;
    expect(large.thickness).toBeGreaterThan(small.thickness);
    const turned = systemOf(pair.nuclei, { couplings: [{ between: ['Ha', 'Hb'], j: 9 }] });
    expect(layoutOf(turned).arcs[0].thickness).toBe(small.thickness);
  });

  it('tells scalar, dipolar and exchange apart', () => {
    const system = systemOf(
      [
        { id: 'A', isotope: '1H', shift: 1 },
        { id: 'B', isotope: '1H', shift: 3 },
      ],
      {
        couplings: [{ between: ['A', 'B'], j: 4, dipolar: { constant: -900 } }],
        states: [
          { id: 's', population: 0.5 },
          { id: 't', population: 0.5, shifts: { A: 3, B: 1 } },
        ],
        exchange: [{ from: 's', to: 't', rate: 40 }],
      },
    );
    expect(layoutOf(system).arcs.map(({ kind, value }) => [kind, value])).toEqual([
      ['scalar', 4],
      ['dipolar', -900],
      ['exchange', 40],
    ]);
  });

  it('folds crowded neighbours of a large system and unfolds them on request', () => {
    const nuclei = Array.from({ length: 30 }, (_, i) => ({
      id: `H${i}`,
      isotope: '1H',
      shift: 1 + (i % 6) + i * 1e-3,
    }));
    const layout = layoutOf(systemOf(nuclei));
    expect(layout.bands[0].bundles.map((bundle) => bundle.count)).toEqual([5, 5, 5, 5, 5, 5]);
    const first = bundleKey(layout.bands[0].bundles[0].ids);
    expect(layoutOf(systemOf(nuclei), new Set([first])).bands[0].bundles).toHaveLength(5);
  });

  it('never lets two labels of one row touch while rows are left', () => {
    const nuclei = [0, 0.01, 0.02].map((shift, i) => ({ id: `Proton${i}`, isotope: '1H', shift }));
    const rows = layoutOf(systemOf(nuclei)).bands[0].threads.map((thread) => thread.labelRow);
    expect(new Set(rows).size).toBe(Math.min(3, WEAVE.maxLabelRows));
  });
});
