import { expect, it } from 'vitest';
import { drawnAxes } from './axes';

it('draws the tensor along the molecule without a turn', () => {
  const { molecule, tensor } = drawnAxes([0, 0, 0], 200);
  tensor.forEach((axis, i) => {
    expect(axis.x).toBeCloseTo(molecule[i].x);
    expect(axis.y).toBeCloseTo(molecule[i].y);
  });
});

it('turns X onto y by a = 90 degrees, as the active rotation Rz(a) does', () => {
  const { molecule, tensor } = drawnAxes([90, 0, 0], 200);
  expect(tensor[0].x).toBeCloseTo(molecule[1].x);
  expect(tensor[0].y).toBeCloseTo(molecule[1].y);
});
