import { eulerAngles, multiply3, rotationMatrix, type Matrix3 } from '../algebra/rotation.js';
import type { Euler } from '../documents/system.schema.js';

/**
 * Orientations of a crystal that is turned in steps of `step` degrees about an axis fixed in the laboratory (z along the field),
 * the first one `start`. Throws a RangeError for an axis without length.
 */
export function rotationSeries(
  start: Readonly<Euler>,
  axis: readonly [number, number, number],
  step: number,
  count: number,
): Euler[] {
  const length = Math.hypot(...axis);
  if (length === 0) throw new RangeError('the axis of a rotation has a direction');
  const first = rotationMatrix(start);
  return Array.from({ length: count }, (_, k) => eulerAngles(multiply3(rotationAbout(axis, k * step, length), first)));
}

/** Rotation by `degrees` about an axis (O. Rodrigues, J. Math. Pures Appl. 5, 380 (1840)). */
function rotationAbout(axis: readonly [number, number, number], degrees: number, length: number): Matrix3 {
  const angle = (degrees * Math.PI) / 180;
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const [x, y, z] = axis.map((component) => component / length);
  const t = 1 - c;
  // prettier-ignore
  return Float64Array.of(
    c + t * x * x, t * x * y - s * z, t * x * z + s * y,
    t * y * x + s * z, c + t * y * y, t * y * z - s * x,
    t * z * x - s * y, t * z * y + s * x, c + t * z * z,
  );
}
