import { expect, it } from 'vitest';
import { readXyz, systemFromGeometry } from '@heddle/shared';
import { checkDraft } from './check';
import { EMPTY_DRAFT, newRow } from './draft';
import { withGeometry } from './geometry';

const found = systemFromGeometry(readXyz('2\npair\nH 0 0 0\nH 0 0 1.58\n'), { H: '1H' }, 3);

it('puts nuclei and couplings of a structure into an empty draft, ready to be simulated', () => {
  const { system } = checkDraft({ ...withGeometry(EMPTY_DRAFT, found), name: 'Pair' });
  expect(system?.nuclei.map(({ position }) => position)).toEqual([
    [0, 0, 0],
    [0, 0, 1.58],
  ]);
  expect(system?.couplings).toMatchObject([{ between: ['H1', 'H2'], dipolar: 'positions' }]);
});

it('keeps what is known of a nucleus of the same name, and adds no pair twice', () => {
  const draft = {
    ...EMPTY_DRAFT,
    name: 'Known',
    nuclei: [newRow({ id: 'H1', isotope: '1H', shift: '4.2' }), newRow({ id: 'H2', isotope: '1H', shift: '4.3' })],
    couplings: [newRow({ 'between.0': 'H2', 'between.1': 'H1', j: '-12' })],
  };
  const { system } = checkDraft(withGeometry(draft, found));
  expect(system?.nuclei.map(({ shift }) => shift)).toEqual([4.2, 4.3]);
  expect(system?.couplings).toMatchObject([{ j: -12, dipolar: 'positions' }]);
});
