import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../test/documents.js';
import { excitation, idealPulses, rotatingFrame } from './pulses.js';

describe('pulses', () => {
  it('excites as a turn about the effective field: nothing lost on resonance, numbers by integrating the Bloch equations', () => {
    expect(excitation(0, 25e3)).toEqual({ amplitude: 1, phase: 0 });
    for (const offset of [2e3, 10e3, 40e3]) {
      const { amplitude, phase } = excitation(offset, 25e3);
      // dM/dt = w x M by small exact steps of Heun's method.
      let m = [0, 0, 1];
      const steps = 20_000;
      const dt = 1 / (4 * 25e3) / steps;
      const cross = ([x, y, z]: number[]) => {
        const [wx, wz] = [2 * Math.PI * 25e3, 2 * Math.PI * offset];
        return [-wz * y, wz * x - wx * z, wx * y];
      };
      for (let k = 0; k < steps; k++) {
        const slope = cross(m);
        const next = cross(m.map((value, i) => value + dt * slope[i]));
        m = m.map((value, i) => value + (dt / 2) * (slope[i] + next[i]));
      }
      expect(amplitude).toBeCloseTo(Math.hypot(m[0], m[1]), 5);
      expect(phase).toBeCloseTo((Math.atan2(m[0], -m[1]) * 180) / Math.PI, 2);
    }
  });

  it('warns for lines far from the carrier and says nothing of sequences without ideal pulses', () => {
    const far = systemOf({ nuclei: [{ id: 'F', isotope: '19F', shift: -100 }] });
    const experiment = experimentOf({ observe: '19F' });
    const entry = idealPulses(far, experiment);
    expect(entry.made).toBe(true);
    expect(entry.hz).toBeCloseTo(105 * 400 * 0.94094011, 2);
    expect(entry.hz).toBeGreaterThan(entry.warnAbove);
    const finite = experimentOf({
      observe: '19F',
      sequence: { steps: [{ pulse: { on: '19F', flip: 90, seconds: 1e-5 } }, { acquire: {} }] },
    });
    expect(idealPulses(far, finite)).toMatchObject({ made: false, hz: 0 });
    // 25 kHz at 376 MHz: nu1^2/(4 nu0) = 0.415 Hz.
    expect(rotatingFrame(finite)!.hz).toBeCloseTo(25e3 ** 2 / (4 * 400e6 * 0.94094011), 9);
    expect(rotatingFrame(experiment)).toBeNull();
  });
});
