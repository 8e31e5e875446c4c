import type { CageDraft, Ring } from './cage-draft';
import { add, cross, dot, mean, mix, subtract, tangentAt, times, unit, type Vec } from './vector';

/**
 * How far outside its limit curve a ring's control polygon lies: a uniform cubic B-spline through n points of a circle
 * has the radius (4 + 2 cos(2π/n))/6 of it. Radii in this folder are those of the limit surface.
 */
export function cageRadius(sides: number): number {
  return 6 / (4 + 2 * Math.cos((2 * Math.PI) / sides));
}

/** A cross-section of a limb: centre, radii along the limb's hint direction and across it, part of the skin that leads here. */
export interface LimbStation {
  at: Vec;
  radii: readonly [number, number];
  part: string;
  /** Direction that the section faces, where the path's own would be wrong. */
  towards?: Vec;
  /** A crisp edge all round, as at a hoof's sole. */
  sharp?: boolean;
}

export interface LimbOptions {
  /** Direction of the first radius; must not run along the limb. */
  hint: Vec;
  /** How far the closing cap bulges beyond the last station. */
  bulge?: number;
}

/** Extrudes a ring along stations and closes the end. Returns the rings of the stations. */
export function growLimb(draft: CageDraft, start: Ring, stations: readonly LimbStation[], { hint, bulge = 0 }: LimbOptions): Ring[] {
  const path = [mean(start.map((vertex) => draft.points[vertex])), ...stations.map((station) => station.at)];
  const sides = start.length;
  let previous = start;
  let turn: number | null = null;
  const rings = stations.map((station, i) => {
    const direction = station.towards ?? tangentAt(path, i + 1);
    const [e1, e2] = crossFrame(direction, hint);
    turn ??= alignment(draft, start, path[0], e1, e2);
    const ring = ringOf(draft, station.at, e1, e2, station.radii, sides, turn);
    draft.band(station.part, previous, ring);
    if (station.sharp) draft.sharpenRing(ring);
    previous = ring;
    return ring;
  });
  const direction = tangentAt(path, path.length - 1);
  closeRing(draft, stations[stations.length - 1].part, previous, times(direction, bulge));
  return rings;
}

/** Two directions square to `direction` with e1 × e2 = direction, e1 as near to the hint as can be. */
export function crossFrame(direction: Vec, hint: Vec): [Vec, Vec] {
  const e1 = unit(subtract(hint, times(direction, dot(hint, direction))));
  return [e1, cross(direction, e1)];
}

/** A ring of vertices on an ellipse; `turn` is the angle of the first one. */
export function ringOf(draft: CageDraft, at: Vec, e1: Vec, e2: Vec, radii: readonly [number, number], sides: number, turn: number): Ring {
  const grow = cageRadius(sides);
  return Array.from({ length: sides }, (_, i) => {
    const angle = turn + (2 * Math.PI * i) / sides;
    return draft.add(add(at, add(times(e1, radii[0] * grow * Math.cos(angle)), times(e2, radii[1] * grow * Math.sin(angle)))));
  });
}

/** Angle of a ring's first vertex that twists least against the ring it grows from. */
function alignment(draft: CageDraft, start: Ring, centre: Vec, e1: Vec, e2: Vec): number {
  let sine = 0;
  let cosine = 0;
  start.forEach((vertex, i) => {
    const from = subtract(draft.points[vertex], centre);
    const angle = Math.atan2(dot(from, e2), dot(from, e1)) - (2 * Math.PI * i) / start.length;
    sine += Math.sin(angle);
    cosine += Math.cos(angle);
  });
  return Math.atan2(sine, cosine);
}

/** Closes an even ring with quads in a grid as square as can be; inner points are pushed along `bulge`. */
export function closeRing(draft: CageDraft, part: string, ring: Ring, bulge: Vec): void {
  const half = ring.length / 2;
  if (!Number.isInteger(half)) throw new RangeError('only even rings close with quads');
  const height = Math.floor(half / 2);
  const width = half - height;
  const grid: number[][] = Array.from({ length: height + 1 }, () => new Array<number>(width + 1).fill(-1));
  ring.forEach((vertex, i) => {
    const [row, column] = borderCell(i, width, height);
    grid[row][column] = vertex;
  });
  for (let row = 1; row < height; row++) {
    for (let column = 1; column < width; column++) {
      const across = mix(draft.points[grid[row][0]], draft.points[grid[row][width]], column / width);
      const along = mix(draft.points[grid[0][column]], draft.points[grid[height][column]], row / height);
      grid[row][column] = draft.add(add(mix(across, along, 0.5), bulge));
    }
  }
  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      draft.face(part, grid[row][column], grid[row][column + 1], grid[row + 1][column + 1], grid[row + 1][column]);
    }
  }
}

/** Where the i-th ring vertex lies on the border of a grid, walking counter-clockwise from its first corner. */
function borderCell(i: number, width: number, height: number): [number, number] {
  if (i <= width) return [0, i];
  if (i <= width + height) return [i - width, width];
  if (i <= 2 * width + height) return [height, 2 * width + height - i];
  return [2 * width + 2 * height - i, 0];
}
