import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import { EngineError, type RunContext } from '../../run/context.js';
import { CoupledSpins } from './coupled-spins.js';
import { orientedCost } from './oriented-cost.js';
import { observedClusters } from './oriented-spins.js';
import { planParts, solveOriented } from './solve-oriented.js';

/** Protons in a row, all coupled. */
const protons = (count: number) =>
  systemOf({
    nuclei: Array.from({ length: count }, (_, k) => ({
      id: `H${k}`,
      isotope: '1H',
      shift: 5,
      position: [2 * k, 0, 0],
    })),
    couplings: Array.from({ length: count - 1 }, (_, k) => ({ between: [`H${k}`, `H${k + 1}`], dipolar: 'positions' })),
  });

const powder = (orientations: number) => experimentOf({ sample: { kind: 'powder', orientations } });

describe('orientedCost', () => {
  it('counts the blocks and transitions of the product basis that is built', () => {
    const system = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: 1, count: 2 },
        { id: 'B', isotope: '1H', shift: 2 },
        { id: 'N', isotope: '14N', shift: 3, quadrupole: { cq: 1e5 } },
      ],
      couplings: [
        { between: ['A', 'B'], j: 7 },
        { between: ['B', 'N'], j: 20 },
      ],
    });
    const [cluster] = observedClusters(system, powder(100), []);
    const { blocks, spins } = new CoupledSpins(cluster);
    expect(spins).toHaveLength(4);
    const cost = orientedCost(system, powder(100));
    expect(cost.largestBlock).toBe(Math.max(...blocks.map(({ states }) => states.length)));
    expect(cost.transitions).toBe(solveOriented(system, powder(1), { tick: () => undefined }).dimensions.transitions);
  });

  it('counts the transitions of a closed form', () => {
    const system = systemOf({
      nuclei: [
        { id: 'Al', isotope: '27Al', shift: 1, quadrupole: { cq: 1e6 } },
        { id: 'N', isotope: '14N', shift: 3 },
      ],
      couplings: [{ between: ['Al', 'N'], dipolar: { constant: 500 } }],
    });
    // 2I = 5 transitions for each of three projections of 14N.
    const { transitions } = orientedCost(
      system,
      experimentOf({ observe: '27Al', sample: { kind: 'powder', orientations: 9 } }),
    );
    expect(transitions).toBe(15);
  });

  it('refuses at once what breaks the limits, with the numbers', () => {
    const context: RunContext = { tick: () => undefined, limits: { bytes: 2 ** 28, seconds: 60 } };
    const refused = (run: () => unknown, path: string) => {
      try {
        run();
      } catch (error) {
        expect(error).toBeInstanceOf(EngineError);
        expect((error as EngineError).code).toBe('TOO_LARGE');
        expect((error as EngineError).path).toBe(path);
        return (error as EngineError).message;
      }
      throw new Error('was not refused');
    };
    expect(refused(() => solveOriented(protons(24), powder(1000), context), 'nuclei')).toMatch(
      /limits are 256 MiB and 60 s/,
    );
    refused(() => solveOriented(protons(6), powder(1_000_000), context), 'sample.orientations');
    expect(planParts(protons(24), powder(1000))).toBe(64);
  });
});
