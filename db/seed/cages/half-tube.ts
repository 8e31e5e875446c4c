import type { CageDraft, Ring } from './cage-draft';
import { cageRadius } from './rings';
import { add, cross, mix, tangentAt, times, unit, type Vec } from './vector';

/** Vertices from the lower middle line over the left side to the upper one: the left half of a ring, x ≥ 0. */
export type HalfRing = number[];

/** A cross-section of a trunk that lies on the middle plane. */
export interface TrunkStation {
  y: number;
  z: number;
  /** Half width across the middle plane and half height in it. */
  radii: readonly [number, number];
  /** Part of the skin from here to the next station (the last one's is the cap's). */
  part: string;
  /** Direction of the trunk in the middle plane (y, z), where the path's own would be wrong. */
  towards?: readonly [number, number];
  /** Moves single vertices of the section: column counted from below, in (across, up) of the section. */
  shift?: Readonly<Record<number, readonly [number, number]>>;
  /** Superellipse: 1 is round, above 1 boxier, below 1 more pointed. */
  square?: number;
}

/** Faces left out of the trunk, where a limb grows: rows between stations, columns from below. */
export interface Opening {
  rows: readonly [number, number];
  columns: readonly [number, number];
}

export interface Trunk {
  rows: HalfRing[];
  /** The border of each opening: closed where it lies on one side, else the open half from middle line to middle line. */
  openings: Ring[];
}

/** Lays half rings along stations and joins them; both ends stay open for caps or limbs. `segments` is the number of faces on each side. */
export function layTrunk(draft: CageDraft, stations: readonly TrunkStation[], segments: number, holes: readonly Opening[]): Trunk {
  const path = stations.map((station): Vec => [0, station.y, station.z]);
  const rows = stations.map((station, i) => halfRing(draft, station, station.towards ? unit([0, ...station.towards]) : tangentAt(path, i), segments));
  return { rows, openings: skinTrunk(draft, rows, stations.map((station) => station.part), segments, holes) };
}

/** Goes on from a half ring that is there already (an opening on the middle line, or another trunk's end). */
export function growTrunk(draft: CageDraft, start: HalfRing, startPart: string, stations: readonly TrunkStation[], holes: readonly Opening[] = []): Trunk {
  const segments = start.length - 1;
  const first = draft.points[start[0]];
  const last = draft.points[start[segments]];
  const path = [mix(first, last, 0.5), ...stations.map((station): Vec => [0, station.y, station.z])];
  const rows = [start, ...stations.map((station, i) => halfRing(draft, station, station.towards ? unit([0, ...station.towards]) : tangentAt(path, i + 1), segments))];
  return { rows, openings: skinTrunk(draft, rows, [startPart, ...stations.map((station) => station.part)], segments, holes) };
}

function halfRing(draft: CageDraft, station: TrunkStation, direction: Vec, segments: number): HalfRing {
  const up = cross(direction, [1, 0, 0]);
  const grow = cageRadius(2 * segments);
  const power = 1 / (station.square ?? 1);
  return Array.from({ length: segments + 1 }, (_, column) => {
    const angle = -Math.PI / 2 + (Math.PI * column) / segments;
    const middle = column === 0 || column === segments;
    const across = middle ? 0 : Math.cos(angle) ** power;
    const along = Math.sign(Math.sin(angle)) * Math.abs(Math.sin(angle)) ** power;
    const [dx, dy] = station.shift?.[column] ?? [0, 0];
    const x = middle ? 0 : station.radii[0] * grow * across + dx;
    const place = add([0, station.y, station.z], times(up, station.radii[1] * grow * along + dy));
    return draft.add([x, place[1], place[2]]);
  });
}

function skinTrunk(draft: CageDraft, rows: HalfRing[], parts: string[], segments: number, holes: readonly Opening[]): Ring[] {
  for (let row = 0; row + 1 < rows.length; row++) {
    for (let column = 0; column < segments; column++) {
      if (holes.some((hole) => inside(hole, row, column))) continue;
      draft.face(parts[row], rows[row][column], rows[row][column + 1], rows[row + 1][column + 1], rows[row + 1][column]);
    }
  }
  return holes.map((hole) => openingBorder(rows, segments, hole));
}

function inside({ rows, columns }: Opening, row: number, column: number): boolean {
  return row >= rows[0] && row < rows[1] && column >= columns[0] && column < columns[1];
}

function openingBorder(rows: HalfRing[], segments: number, { rows: [r0, r1], columns: [c0, c1] }: Opening): Ring {
  const near = Array.from({ length: c1 - c0 + 1 }, (_, i) => rows[r0][c0 + i]);
  const top = Array.from({ length: r1 - r0 - 1 }, (_, i) => rows[r0 + 1 + i][c1]);
  const far = Array.from({ length: c1 - c0 + 1 }, (_, i) => rows[r1][c1 - i]);
  const bottom = Array.from({ length: r1 - r0 - 1 }, (_, i) => rows[r1 - 1 - i][c0]);
  if (c1 === segments) return [...far, ...bottom, ...near];
  if (c0 === 0) return [...near, ...top, ...far];
  return [...near, ...top, ...far, ...bottom];
}

/** Middle points of a half cap, from the lower end of the half ring to the upper. */
function capMiddle(draft: CageDraft, ring: HalfRing, bulge: Vec): number[] {
  const count = ring.length - 4;
  const from = draft.points[ring[0]];
  const to = draft.points[ring[ring.length - 1]];
  return Array.from({ length: count }, (_, i) => draft.add(add(mix(from, to, (i + 1) / (count + 1)), bulge)));
}

/** Closes the far end of a trunk with a strip of quads along the middle line. */
export function closeTrunk(draft: CageDraft, part: string, ring: HalfRing, bulge: Vec): void {
  const last = ring.length - 1;
  const middle = [ring[0], ...capMiddle(draft, ring, bulge), ring[last]];
  for (let i = 0; i + 1 < middle.length; i++) draft.face(part, middle[i], ring[i + 1], ring[i + 2], middle[i + 1]);
}

/** The near end of a trunk, seen from there: pass it to `closeTrunk` or `forkTrunk`. */
export function nearEnd(trunk: Trunk): HalfRing {
  return [...trunk.rows[0]].reverse();
}

/** Parts a trunk's end in two, as a pelvis parts into legs: returns the ring of the left branch, whose inner side lies on the middle plane. */
export function forkTrunk(draft: CageDraft, ring: HalfRing, bulge: Vec): Ring {
  return [...ring, ...capMiddle(draft, ring, bulge).reverse()];
}

/**
 * A point on a trunk's surface: `row` counts stations and may lie between two, `angle` runs from −90° below over 0° on the left to 90° above
 * and on over the right side; `lift` is the distance outside. For what is worn.
 */
export function pointOnTrunk(stations: readonly TrunkStation[], row: number, angle: number, lift: number): Vec {
  const i = Math.min(Math.floor(row), stations.length - 2);
  const t = row - i;
  const path = stations.map((station): Vec => [0, station.y, station.z]);
  const direction = unit(mix(tangentAt(path, i), tangentAt(path, i + 1), t));
  const up = cross(direction, [1, 0, 0]);
  const radius = (axis: 0 | 1) => stations[i].radii[axis] + (stations[i + 1].radii[axis] - stations[i].radii[axis]) * t + lift;
  const turned = (angle * Math.PI) / 180;
  return add(mix(path[i], path[i + 1], t), add([radius(0) * Math.cos(turned), 0, 0], times(up, radius(1) * Math.sin(turned))));
}
