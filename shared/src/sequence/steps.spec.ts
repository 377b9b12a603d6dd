import { describe, expect, it } from 'vitest';
import { recipeScans, scansOf } from './steps.js';

const pulse = (on: string, flip: number, phase = 0) => ({ pulse: { on, flip, phase } });
const acquire = (phase = 0) => ({ acquire: { phase } });

describe('recipeScans', () => {
  it('writes echoes with their pulses across the first', () => {
    const echo = [{ delay: 0.01 }, pulse('1H', 180, 90), { delay: 0.01 }];
    expect(recipeScans({ recipe: 'spin-echo', tau: 0.01 }, '1H')).toEqual([
      { steps: [pulse('1H', 90), ...echo, acquire()], weight: 1 },
    ]);
    expect(recipeScans({ recipe: 'cpmg', tau: 0.01, loops: 3 }, '1H')[0].steps).toEqual([
      ...[pulse('1H', 90), ...echo, ...echo, ...echo, acquire()],
    ]);
    expect(recipeScans({ recipe: 'quadrupole-echo', tau: 1e-5 }, '2H')[0].steps).toEqual([
      ...[pulse('2H', 90), { delay: 1e-5 }, pulse('2H', 90, 90), { delay: 1e-5 }, acquire()],
    ]);
  });

  it('writes recoveries', () => {
    expect(recipeScans({ recipe: 'inversion-recovery', delay: 2 }, '13C')[0].steps).toEqual([
      ...[pulse('13C', 180), { delay: 2 }, pulse('13C', 90), acquire()],
    ]);
    expect(recipeScans({ recipe: 'saturation-recovery', delay: 2 }, '13C')[0].steps).toEqual([
      ...[pulse('13C', 90), { spoil: true }, { delay: 2 }, pulse('13C', 90), acquire()],
    ]);
  });

  it('writes transfers in two scans, first pulse and receiver turned together', () => {
    const recipe = { recipe: 'inept', from: '1H', j: -125, refocused: true, multiplicity: 2 } as const;
    const scans = recipeScans(recipe, '13C');
    expect(scans.map(({ weight }) => weight)).toEqual([0.5, 0.5]);
    scans.forEach(({ steps }, scan) => {
      expect(steps[0]).toEqual(pulse('1H', 90, 180 * scan));
      expect(steps.at(-1)).toEqual(acquire(180 * scan));
    });
    const delays = scans[0].steps.flatMap((step) => ('delay' in step ? [step.delay] : []));
    // 1/(4|J|) twice, then half of asin(1/sqrt 2)/(pi |J|) = 1/(4|J|) twice.
    [2e-3, 2e-3, 1e-3, 1e-3].forEach((seconds, k) => expect(delays[k]).toBeCloseTo(seconds, 12));
    expect(recipeScans({ ...recipe, refocused: false }, '13C')[0].steps).toHaveLength(8);
    const dept = recipeScans({ recipe: 'dept', from: '1H', j: 125, theta: 45 }, '13C')[0].steps;
    expect(dept.filter((step) => 'delay' in step)).toEqual([{ delay: 4e-3 }, { delay: 4e-3 }, { delay: 4e-3 }]);
    expect(dept[5]).toEqual(pulse('1H', 45, 90));
  });

  it('takes a scan without saturation off one with it', () => {
    const [on, off] = recipeScans({ recipe: 'noe-difference', saturate: 'Ha', time: 5 }, '1H');
    expect([on.weight, off.weight]).toEqual([1, -1]);
    expect(on.steps[0]).toEqual({ saturate: { nucleus: 'Ha', seconds: 5, nutationHz: 50 } });
    expect(off.steps[0]).toEqual({ delay: 5 });
    expect(off.steps.slice(1)).toEqual(on.steps.slice(1));
  });
});

describe('scansOf', () => {
  it('gives each row of a phase cycle its scan, the phases of the row in place of the steps', () => {
    const steps = [pulse('1H', 90, 10), { delay: 1 }, pulse('1H', 180, 20), acquire(30)];
    const phaseCycle = [
      [0, 90, 0],
      [180, 90, 180],
    ];
    const scans = scansOf({ observe: '1H', sequence: { steps, phaseCycle } });
    expect(scans).toEqual(
      phaseCycle.map(([first, second, receiver]) => ({
        steps: [pulse('1H', 90, first), { delay: 1 }, pulse('1H', 180, second), acquire(receiver)],
        weight: 0.5,
      })),
    );
    expect(scansOf({ observe: '1H', sequence: { steps } })).toEqual([{ steps, weight: 1 }]);
  });
});
