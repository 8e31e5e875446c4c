import type { FanKit } from './fan-kit';
import type { FanState } from './fan-state';

/** The points of a fan's rings 0 to 2 that its refinement reads, numbered; where each stands in a state. */
export interface FanPoints {
  count: number;
  /** 0 centre, 1 spokes, 2 inner. */
  arrays: Uint8Array;
  /** Offset of x there. */
  offsets: Int32Array;
}

/** Numbers the points of a kind of fan. */
export function fanPoints(kit: FanKit, kind: FanState): FanPoints {
  const arrays: number[] = [];
  const offsets: number[] = [];
  if (kit.hasSpokes) {
    arrays.push(0);
    offsets.push(0);
    for (let spoke = 0; spoke < kind.spokes.length; spoke += 9) {
      arrays.push(1, 1);
      offsets.push(spoke, spoke + 3);
    }
  }
  for (let j = 0; j < kind.sectors; j++) {
    for (const offset of kit.innerPoints) {
      arrays.push(2);
      offsets.push(27 * j + offset);
    }
  }
  return { count: arrays.length, arrays: Uint8Array.from(arrays), offsets: Int32Array.from(offsets) };
}

/** The array of a state that holds a point. */
export function pointArray(points: FanPoints, fan: FanState, point: number): Float64Array {
  const which = points.arrays[point];
  if (which === 0) return fan.centre;
  return which === 1 ? fan.spokes : fan.inner;
}

/** Copies a fan's points into `packed` from `at` on, x, y, z each, less `shift`. */
export function packPoints(points: FanPoints, fan: FanState, shift: Float64Array, packed: Float64Array, at: number): void {
  for (let i = 0; i < points.count; i++) {
    const source = pointArray(points, fan, i);
    const from = points.offsets[i];
    packed[at + 3 * i] = source[from] - shift[0];
    packed[at + 3 * i + 1] = source[from + 1] - shift[1];
    packed[at + 3 * i + 2] = source[from + 2] - shift[2];
  }
}

/**
 * Calls `visit` with unit vectors, three at a time: point `first` moved by `unit` along x, the next along y, the one after along z; `fan` is clear again afterwards.
 * What a linear map makes of x, y and z are then its factors of three points.
 */
export function forUnitVectors(points: FanPoints, fan: FanState, visit: (first: number) => void): void {
  for (let first = 0; first < points.count; first += 3) {
    for (const value of [1, 0]) {
      for (let axis = 0; axis < 3 && first + axis < points.count; axis++) pointArray(points, fan, first + axis)[points.offsets[first + axis] + axis] = value;
      if (value === 1) visit(first);
    }
  }
}
