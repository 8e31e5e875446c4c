/** A point or direction in the asset's axes: centimetres, y up, the creature's nose towards +z, its left side at +x. */
export type Vec = readonly [number, number, number];

export const add = (a: Vec, b: Vec): Vec => [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
export const subtract = (a: Vec, b: Vec): Vec => [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
export const times = (a: Vec, s: number): Vec => [a[0] * s, a[1] * s, a[2] * s];
export const dot = (a: Vec, b: Vec): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
export const cross = (a: Vec, b: Vec): Vec => [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
export const mix = (a: Vec, b: Vec, t: number): Vec => [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t, a[2] + (b[2] - a[2]) * t];

export function unit(a: Vec): Vec {
  const length = Math.sqrt(dot(a, a));
  if (!(length > 0)) throw new RangeError('a direction of length zero');
  return times(a, 1 / length);
}

export function mean(points: readonly Vec[]): Vec {
  return times(points.reduce(add, [0, 0, 0]), 1 / points.length);
}

/** Direction of a path at station i: between its neighbours, so that rings stand square to the bend. */
export function tangentAt(path: readonly Vec[], i: number): Vec {
  return unit(subtract(path[Math.min(i + 1, path.length - 1)], path[Math.max(i - 1, 0)]));
}
