/** A point of a drawing, and how near it is to the reader. */
export interface Projected {
  x: number;
  y: number;
  depth: number;
}

/**
 * Positions seen along z after turns by `yaw` about the vertical and `pitch` about the horizontal axis of the drawing
 * (radians), centred, scaled to fit a square of `size`.
 */
export function project(
  positions: readonly (readonly number[])[],
  yaw: number,
  pitch: number,
  size: number,
): Projected[] {
  const count = Math.max(1, positions.length);
  const centre = [0, 1, 2].map((axis) => positions.reduce((sum, position) => sum + position[axis], 0) / count);
  const moved = positions.map((position) => position.map((x, axis) => x - centre[axis]));
  const reach = Math.max(1, ...moved.map((position) => Math.hypot(...position)));
  const scale = (0.42 * size) / reach;
  return moved.map(([x, y, z]) => {
    const [across, deep] = [x * Math.cos(yaw) + z * Math.sin(yaw), z * Math.cos(yaw) - x * Math.sin(yaw)];
    const [up, depth] = [y * Math.cos(pitch) - deep * Math.sin(pitch), deep * Math.cos(pitch) + y * Math.sin(pitch)];
    return { x: size / 2 + scale * across, y: size / 2 - scale * up, depth };
  });
}
