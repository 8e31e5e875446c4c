import type { CageDraft, Ring } from './cage-draft';
import { cageRadius, closeRing, crossFrame, ringOf } from './rings';
import { add, subtract, tangentAt, times, unit, type Vec } from './vector';

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
  /** Radius across the hint direction beside that along it; one for all stations or one each. */
  flat?: number | readonly number[];
  /** Crisp edges along the path and around the ends, as of sawn timber. */
  sharp?: boolean;
}

/** A tube along a path. */
export function layRope(draft: CageDraft, part: string, path: readonly Vec[], { radius, sides, hint, closed = false, flat = 1, sharp = false }: RopeOptions): void {
  const n = path.length;
  const rings = path.map((at, i) => {
    const direction = closed ? unit(subtract(path[(i + 1) % n], path[(i + n - 1) % n])) : tangentAt(path, i);
    const [e1, e2] = crossFrame(direction, hint);
    const r = valueAt(radius, i);
    return ringOf(draft, at, e1, e2, [r, r * valueAt(flat, i)], sides, Math.PI / sides);
  });
  for (let i = 0; i + 1 < n; i++) {
    draft.band(part, rings[i], rings[i + 1]);
    if (sharp) rings[i].forEach((vertex, k) => draft.sharpen(vertex, rings[i + 1][k]));
  }
  if (closed) draft.band(part, rings[n - 1], rings[0]);
  else {
    closeRing(draft, part, [...rings[0]].reverse(), [0, 0, 0]);
    closeRing(draft, part, rings[n - 1], [0, 0, 0]);
    if (sharp) for (const ring of [rings[0], rings[n - 1]]) draft.sharpenRing(ring);
  }
}

function valueAt(values: number | readonly number[], i: number): number {
  return typeof values === 'number' ? values : values[i];
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
