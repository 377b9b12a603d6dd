import type { SpinSystem } from '../../documents/system.schema.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { EngineError } from '../../run/context.js';
import type { ObservedPart } from './clusters.js';
import { totalSpinComponents } from './total-spin.js';

/** One choice of a total spin for each group of a part, and how often it occurs. */
export interface SectorSpins {
  readonly spins: readonly number[];
  readonly multiplicity: number;
}

/** Choices beyond which a part is refused without counting it out. */
const MOST_CHOICES = 100_000;

const TOO_MANY = `coupled groups make more than ${MOST_CHOICES.toLocaleString('en')} combinations of total spins`;

/** Every choice of one total spin for each group, with its multiplicity; those without observed spin make no signal. */
export function sectorSpins(system: SpinSystem, part: ObservedPart): SectorSpins[] {
  let choices: SectorSpins[] = [{ spins: [], multiplicity: 1 }];
  for (const row of part.nuclei) {
    const { isotope, count } = system.nuclei[row];
    if (choices.length > MOST_CHOICES) throw new EngineError('TOO_LARGE', TOO_MANY, 'nuclei');
    choices = choices.flatMap(({ spins, multiplicity }) =>
      totalSpinComponents(nuclide(isotope).spin, count).map((component) => ({
        spins: [...spins, component.spin],
        multiplicity: multiplicity * component.multiplicity,
      })),
    );
  }
  return choices.filter(({ spins }) => spins.some((spin, p) => part.cluster[p] === 0 && spin > 0));
}
