import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Step } from '../src/documents/experiment.schema.js';
import { solveLiouville } from '../src/dynamics/liouville/solve-liouville.js';
import { SILENT } from '../src/run/context.js';
import { denseRoute } from './dense-route.js';
import { experimentOf, systemOf } from './documents.js';
import { ppmAt, pulse } from './magnetisation.js';

const hertz = fc.double({ min: -300, max: 300, noNaN: true });
const angle = fc.double({ min: -200, max: 200, noNaN: true });
const brief = fc.double({ min: 1e-5, max: 5e-3, noNaN: true });
/** Partners of the first proton: three spins 1/2, or a pair with anything. */
const partners = fc.oneof(
  fc.tuple(fc.constantFrom('1H', '13C', '2H')),
  fc.tuple(fc.constantFrom('1H', '13C'), fc.constantFrom('1H', '13C')),
);

const step = fc.oneof(
  fc.tuple(fc.constantFrom('1H', '13C'), angle, angle).map(([on, flip, phase]): Step => pulse(on, flip, phase)),
  fc.tuple(angle, angle, brief).map(([flip, phase, seconds]): Step => pulse('1H', flip, phase, { seconds })),
  brief.map((delay): Step => ({ delay })),
);

const systems = fc
  .record({
    isotopes: partners,
    shifts: fc.array(hertz, { minLength: 6, maxLength: 6 }),
    j: fc.array(hertz, { minLength: 2, maxLength: 2 }),
    t1: fc.array(fc.double({ min: 0.02, max: 2, noNaN: true }), { minLength: 3, maxLength: 3 }),
    ratio: fc.double({ min: 0.1, max: 2, noNaN: true }),
    rate: fc.double({ min: 1, max: 5000, noNaN: true }),
    population: fc.double({ min: 0.1, max: 0.9, noNaN: true }),
    exchanging: fc.boolean(),
  })
  .map(({ isotopes, shifts, j, t1, ratio, rate, population, exchanging }) => {
    const all = ['1H', ...isotopes].slice(0, exchanging ? 2 : 3);
    const ids = ['A', 'B', 'C'];
    return systemOf({
      nuclei: all.map((name, n) => ({
        id: ids[n],
        isotope: name,
        shift: ppmAt(shifts[n], name),
        t1: t1[n],
        t2: ratio * t1[n],
      })),
      couplings: all.slice(1).map((_, n) => ({ between: [ids[n], ids[n + 1]] as [string, string], j: j[n] / 10 })),
      ...(exchanging && {
        states: [
          { id: 'p', population },
          { id: 'q', population: 1 - population, shifts: { A: ppmAt(shifts[3]) }, j: { 'B,A': j[1] / 10 } },
        ],
        exchange: [{ from: 'p', to: 'q', rate }],
      }),
    });
  });

describe('the slow route by dense Liouvillians', () => {
  it.each(['t1-t2', 'line-width'] as const)(
    'agrees for any steps with %s',
    (relaxation) => {
      fc.assert(
        fc.property(systems, fc.array(step, { minLength: 1, maxLength: 4 }), (system, steps) => {
          const experiment = experimentOf({
            relaxation,
            lineWidth: 0,
            acquisition: { centre: 5, width: 700, points: 6 },
            sequence: { steps: [pulse('1H', 90), ...steps, { acquire: { phase: 0 } }] },
          });
          const { fid } = solveLiouville(system, experiment, SILENT);
          const slow = denseRoute(system, experiment);
          for (let k = 0; k < 6; k++) {
            expect(Math.hypot(fid.real[k] - slow.real[k], fid.imag[k] - slow.imag[k])).toBeLessThan(1e-8);
          }
        }),
        { numRuns: 8 },
      );
    },
    60_000,
  );
});
