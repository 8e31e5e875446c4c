import type { Cage } from './cage';
import type { MeasureOptions, Six, Three } from './measured';
import { findBorderEdges } from './mesh/partition';
import { buildTopology } from './mesh/topology';
import type { Frames } from './mesh/frames';
import { integrateCage, integrateLimit } from './moments/integrate-limit';

/** Moments about the file's origin, at unit density. */
export interface RawMoments {
  volume: number;
  first: Three;
  /** xx, yy, zz, xy, xz, yz. */
  second: Six;
}

/**
 * Signed moments of the cones from `apex` (file frame) to the limit surface of a whole manifold cage, holes included, without caps, about the file's origin.
 * For a closed surface they are the solid's, whatever the apex. Throws where the cage could not be resolved.
 */
export function limitConeMoments(cage: Cage, options: Omit<MeasureOptions, 'partsBy'>, apex: Three): RawMoments {
  const { mesh } = buildTopology(cage);
  const one = new Int32Array(mesh.faces);
  const bodies = { partNames: [''], partOf: one, holePart: -1, toldOf: one, bodyOf: one, bodies: 1, partOfBody: new Int32Array(1), pieceOf: one, pieces: 1, borders: findBorderEdges(mesh, one) };
  const frames: Frames = {
    positions: cage.positions.map((value, i) => value - apex[i % 3]),
    pieceCentres: Float64Array.from(apex),
    origins: new Float64Array(3),
    boxes: new Float64Array(6),
  };
  const blocked = new Uint8Array(1);
  const sums = options.scheme === 'polyhedral' ? integrateCage(mesh, frames, bodies, blocked, true) : integrateLimit(mesh, frames, bodies, blocked, { ...options, partsBy: 'whole' });
  if (!sums.resolved) throw new Error('the limit surface could not be resolved');
  const m = sums.solid.total(0);
  const first: Three = [0, 1, 2].map((axis) => m[1 + axis] + m[0] * apex[axis]) as Three;
  const about = (i: number, a: number, b: number): number => m[i] + apex[a] * m[1 + b] + apex[b] * m[1 + a] + m[0] * apex[a] * apex[b];
  return { volume: m[0], first, second: [about(4, 0, 0), about(5, 1, 1), about(6, 2, 2), about(7, 0, 1), about(8, 0, 2), about(9, 1, 2)] };
}
