import type { CageDraft, Ring } from './cage-draft';
import { cageRadius, closeRing, crossFrame, ringOf } from './rings';
import { add, mix, tangentAt, times, unit, type Vec } from './vector';

/** A circle of a turned solid: radius of the limit surface and place along the axis. */
export interface TurnStation {
  radius: number;
  along: number;
  sharp?: boolean;
}

export interface TurnOptions {
  origin: Vec;
  axis: Vec;
  sides: number;
  /** The profile returns to its start (a hoop); else both ends are closed with quads. */
  closed?: boolean;
}

/** A turned solid: the profile runs along the axis with the outside on its right hand, so the surface faces outwards. */
export function turnSolid(draft: CageDraft, part: string, profile: readonly TurnStation[], { origin, axis, sides, closed = false }: TurnOptions): Ring[] {
  const direction = unit(axis);
  const [e1, e2] = crossFrame(direction, Math.abs(direction[2]) > 0.9 ? [1, 0, 0] : [0, 0, 1]);
  const rings = profile.map(({ radius, along, sharp }) => {
    const ring = ringOf(draft, add(origin, times(direction, along)), e1, e2, [radius, radius], sides, Math.PI / sides);
    if (sharp) draft.sharpenRing(ring);
    return ring;
  });
  for (let i = 0; i + 1 < rings.length; i++) draft.band(part, rings[i], rings[i + 1]);
  if (closed) draft.band(part, rings[rings.length - 1], rings[0]);
  else {
    closeRing(draft, part, [...rings[0]].reverse(), [0, 0, 0]);
    closeRing(draft, part, rings[rings.length - 1], [0, 0, 0]);
  }
  return rings;
}

export interface RopeOptions {
  /** Radius of the limit surface; one for all stations or one each. */
  radius: number | readonly number[];
  sides: number;
  hint: Vec;
  /** The path returns to its start. */
  closed?: boolean;
  /** Radius across the hint direction beside that along it. */
  flat?: number;
}

/** A tube along a path. */
export function layRope(draft: CageDraft, part: string, path: readonly Vec[], { radius, sides, hint, closed = false, flat = 1 }: RopeOptions): void {
  const n = path.length;
  const rings = path.map((at, i) => {
    const direction = closed ? unit(subtractAround(path, i)) : tangentAt(path, i);
    const [e1, e2] = crossFrame(direction, hint);
    const r = typeof radius === 'number' ? radius : radius[i];
    return ringOf(draft, at, e1, e2, [r, r * flat], sides, Math.PI / sides);
  });
  for (let i = 0; i + 1 < n; i++) draft.band(part, rings[i], rings[i + 1]);
  if (closed) draft.band(part, rings[n - 1], rings[0]);
  else {
    closeRing(draft, part, [...rings[0]].reverse(), [0, 0, 0]);
    closeRing(draft, part, rings[n - 1], [0, 0, 0]);
  }
}

function subtractAround(path: readonly Vec[], i: number): Vec {
  const n = path.length;
  const next = path[(i + 1) % n];
  const previous = path[(i + n - 1) % n];
  return [next[0] - previous[0], next[1] - previous[1], next[2] - previous[2]];
}

/** Corners of a block: bottom then top, each counter-clockwise seen from above. */
export type BlockCorners = readonly [Vec, Vec, Vec, Vec, Vec, Vec, Vec, Vec];

/** A block with eight corners whose edges are rounded by holding loops at the share `inset` of each side. */
export function layBlock(draft: CageDraft, part: string, corners: BlockCorners, inset = 0.12): void {
  const steps = [0, inset, 1 - inset, 1];
  const place = (u: number, v: number, w: number): Vec => {
    const floor = mix(mix(corners[0], corners[1], u), mix(corners[3], corners[2], u), v);
    const roof = mix(mix(corners[4], corners[5], u), mix(corners[7], corners[6], u), v);
    return mix(floor, roof, w);
  };
  const known = new Map<number, number>();
  const vertex = (i: number, j: number, k: number): number => {
    const key = i * 16 + j * 4 + k;
    const held = known.get(key) ?? draft.add(place(steps[i], steps[j], steps[k]));
    known.set(key, held);
    return held;
  };
  for (let a = 0; a < 3; a++) {
    for (let b = 0; b < 3; b++) {
      draft.face(part, vertex(a, b, 0), vertex(a, b + 1, 0), vertex(a + 1, b + 1, 0), vertex(a + 1, b, 0));
      draft.face(part, vertex(a, b, 3), vertex(a + 1, b, 3), vertex(a + 1, b + 1, 3), vertex(a, b + 1, 3));
      draft.face(part, vertex(a, 0, b), vertex(a + 1, 0, b), vertex(a + 1, 0, b + 1), vertex(a, 0, b + 1));
      draft.face(part, vertex(a, 3, b), vertex(a, 3, b + 1), vertex(a + 1, 3, b + 1), vertex(a + 1, 3, b));
      draft.face(part, vertex(0, a, b), vertex(0, a, b + 1), vertex(0, a + 1, b + 1), vertex(0, a + 1, b));
      draft.face(part, vertex(3, a, b), vertex(3, a + 1, b), vertex(3, a + 1, b + 1), vertex(3, a, b + 1));
    }
  }
}

/** An upright block from its middle and size. */
export function layBox(draft: CageDraft, part: string, middle: Vec, size: Vec, inset = 0.12): void {
  const [x, y, z] = times(size, 0.5);
  const at = (sx: number, sy: number, sz: number): Vec => add(middle, [sx * x, sy * y, sz * z]);
  layBlock(draft, part, [at(-1, -1, 1), at(1, -1, 1), at(1, -1, -1), at(-1, -1, -1), at(-1, 1, 1), at(1, 1, 1), at(1, 1, -1), at(-1, 1, -1)], inset);
}

/** A sharp-edged plank: its limit surface is the box itself. */
export function layPlank(draft: CageDraft, part: string, corners: BlockCorners): void {
  const v = corners.map((corner) => draft.add(corner));
  draft.face(part, v[0], v[3], v[2], v[1]);
  draft.face(part, v[4], v[5], v[6], v[7]);
  for (let i = 0; i < 4; i++) {
    const next = (i + 1) % 4;
    draft.face(part, v[i], v[next], v[4 + next], v[4 + i]);
    draft.sharpen(v[i], v[4 + i]);
  }
  draft.sharpenRing(v.slice(0, 4));
  draft.sharpenRing(v.slice(4));
}

/** A four-cornered bar between two points, sharp all round; `across` is the direction of its first side. */
export function layBar(draft: CageDraft, part: string, from: Vec, to: Vec, across: Vec, size: readonly [number, number]): void {
  const [e1, e2] = crossFrame(unit([to[0] - from[0], to[1] - from[1], to[2] - from[2]]), across);
  const at = (end: Vec, s: number, t: number): Vec => add(end, add(times(e1, (s * size[0]) / 2), times(e2, (t * size[1]) / 2)));
  layPlank(draft, part, [at(from, -1, -1), at(from, 1, -1), at(from, 1, 1), at(from, -1, 1), at(to, -1, -1), at(to, 1, -1), at(to, 1, 1), at(to, -1, 1)]);
}

/** A closed ball-like solid from a cube of 6 n² quads, each direction moved to `place(direction)`. */
export function layBall(draft: CageDraft, part: string, divisions: number, place: (direction: Vec) => Vec): void {
  const known = new Map<string, number>();
  const vertex = (a: Vec): number => {
    const key = a.join(' ');
    const held = known.get(key) ?? draft.add(place(unit([tan(a[0], divisions), tan(a[1], divisions), tan(a[2], divisions)])));
    known.set(key, held);
    return held;
  };
  const n = divisions;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      for (const side of [-n, n]) {
        const corners: [number, number][] = [[2 * i - n, 2 * j - n], [2 * i + 2 - n, 2 * j - n], [2 * i + 2 - n, 2 * j + 2 - n], [2 * i - n, 2 * j + 2 - n]];
        const ordered = side > 0 ? corners : [...corners].reverse();
        draft.face(part, ...ordered.map(([s, t]) => vertex([s, t, side])));
        draft.face(part, ...ordered.map(([s, t]) => vertex([side, s, t])));
        draft.face(part, ...ordered.map(([s, t]) => vertex([t, side, s])));
      }
    }
  }
}

/** Spreads the lines of a cube's grid so that quads on the ball are nearly equal. */
function tan(step: number, divisions: number): number {
  return Math.tan(((step / divisions) * Math.PI) / 4);
}

/** Radius that the cage of a ball needs for a limit surface of radius 1, nearly: as `cageRadius` along a great circle of 4 n edges, both ways. */
export function ballRadius(divisions: number): number {
  return cageRadius(4 * divisions) ** 2;
}
