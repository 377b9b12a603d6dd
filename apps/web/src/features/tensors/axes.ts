import { rotationMatrix, type Euler } from '@heddle/shared';
import { project } from '../geometry/logic/view';

/** An axis drawn from the middle of a square: where it ends, and whether it points away from the reader. */
export interface DrawnAxis {
  readonly name: string;
  readonly x: number;
  readonly y: number;
  readonly behind: boolean;
}

/** How the molecule is seen: a little from above and from the side, so that no axis hides another. */
const VIEW = { yaw: 0.6, pitch: 0.45 };

/** The axes of the molecule, and those that the Euler angles turn them into, in a square of `size`. */
export function drawnAxes(euler: Readonly<Euler>, size: number): { molecule: DrawnAxis[]; tensor: DrawnAxis[] } {
  const r = rotationMatrix(euler);
  const unit = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  // Column i of R is where axis i goes.
  const turned = unit.map((_, i) => [r[i], r[3 + i], r[6 + i]]);
  // Opposite ends keep the drawing centred.
  const ends = [...unit, ...turned].flatMap((axis) => [axis, axis.map((x) => -x)]);
  const places = project(ends, VIEW.yaw, VIEW.pitch, size).filter((_, i) => i % 2 === 0);
  const named = (first: number, names: readonly string[]) =>
    names.map((name, i) => ({
      name,
      x: places[first + i].x,
      y: places[first + i].y,
      behind: places[first + i].depth < 0,
    }));
  return { molecule: named(0, ['x', 'y', 'z']), tensor: named(3, ['X', 'Y', 'Z']) };
}
