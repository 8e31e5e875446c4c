import type { CreasingRule } from '../cage';
import type { Topology } from '../mesh/topology';

/** Sharpness after one refinement by the uniform rule: infinite stays, else s − 1, at least 0. 32-bit, as the standard computes. */
export function decayed(sharpness: number): number {
  if (sharpness === Infinity) return Infinity;
  return sharpness > 1 ? Math.fround(sharpness - 1) : 0;
}

/** Per vertex, the number and sum of the semi-sharp edges around it; what Chaikin creasing averages. */
export interface SemiSharpAround {
  counts: Int32Array;
  /** In double precision, where 32-bit sharpnesses add up without rounding: the sum does not depend on the order of the edges. */
  sums: Float64Array;
}

/** `corners` are the half-edges of all faces around the vertices of interest. Borders count as infinitely sharp, so not here. */
export function countSemiSharp(mesh: Topology, corners: Int32Array, count: number): SemiSharpAround {
  const counts = new Int32Array(mesh.vertices);
  const sums = new Float64Array(mesh.vertices);
  for (let i = 0; i < count; i++) {
    const h = corners[i];
    const sharpness = mesh.edgeSharpness[h];
    if (mesh.twin[h] < 0 || !(sharpness > 0) || sharpness === Infinity) continue;
    counts[mesh.vertexOf[h]]++;
    sums[mesh.vertexOf[h]] += sharpness;
  }
  return { counts, sums };
}

/**
 * Sharpness of the child edge at `vertex` of an edge with sharpness `s`. Chaikin creasing [DeRose, Kass & Truong 1998]:
 * ¾ own + ¼ mean of the other semi-sharp edges at the vertex, − 1; rounded to 32 bits once.
 */
export function childEdgeSharpness(rule: CreasingRule, s: number, vertex: number, around: SemiSharpAround): number {
  if (!(s > 0)) return 0;
  if (rule === 'uniform' || s === Infinity || around.counts[vertex] < 2) return decayed(s);
  const mixed = 0.75 * s + (0.25 * (around.sums[vertex] - s)) / (around.counts[vertex] - 1);
  return mixed > 1 ? Math.fround(mixed - 1) : 0;
}
