import type { SpinSystemInput } from '../documents/system.schema.js';
import { dipolarPairs, type DipolarPair } from '../interactions/dipolar-from-geometry.js';
import { isIsotope } from '../nuclides/nuclides.js';
import { equivalentAtoms, type Geometry } from './geometry.js';

/** The part of a structure that becomes a spin system. */
export interface GeometrySystem {
  /** Ids are the element and a running number; shifts are left at 0. */
  readonly nuclei: SpinSystemInput['nuclei'];
  /** One for each of `pairs`, dipolar from the positions. */
  readonly couplings: NonNullable<SpinSystemInput['couplings']>;
  /** Pairs within the cut-off with distance and constant, nearest first. */
  readonly pairs: readonly DipolarPair[];
  /** Label of each nucleus, equal for those that no distance tells apart. */
  readonly equivalence: readonly number[];
}

/**
 * Nuclei of the elements that `isotopes` names, like { H: '1H', C: '13C' }, with dipolar couplings between those at most `cutOff`
 * angstrom apart. An atom whose isotope the file gives is that isotope. Throws a RangeError for a name that is no nuclide and for
 * two chosen atoms at one place.
 */
export function systemFromGeometry(
  geometry: Geometry,
  isotopes: Readonly<Record<string, string>>,
  cutOff: number,
): GeometrySystem {
  const classes = equivalentAtoms(geometry.atoms);
  const counts = new Map<string, number>();
  const chosen = geometry.atoms.flatMap(({ element, mass, position }, row) => {
    const number = (counts.get(element) ?? 0) + 1;
    counts.set(element, number);
    if (!(element in isotopes)) return [];
    const isotope = mass === undefined ? isotopes[element] : `${mass}${element}`;
    if (!isIsotope(isotope)) throw new RangeError(`'${isotope}' is not an NMR-active nuclide of the table`);
    return [{ id: `${element}${number}`, isotope, shift: 0, position: [...position] as [number, number, number], row }];
  });
  const pairs = dipolarPairs(chosen, cutOff);
  return {
    nuclei: chosen.map(({ id, isotope, shift, position }) => ({ id, isotope, shift, position })),
    couplings: pairs.map(({ between: [a, b] }) => ({ between: [a, b], dipolar: 'positions' })),
    pairs,
    equivalence: chosen.map(({ row }) => classes[row]),
  };
}
