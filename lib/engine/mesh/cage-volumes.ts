import type { Topology } from './topology';

/** Six times the signed volume of each piece's cage about its own first vertex: only its sign is of use. */
export function cageVolumes(mesh: Topology, p: Float64Array, pieceOf: Int32Array, pieces: number): Float64Array {
  const volumes = new Float64Array(pieces);
  const origin = new Int32Array(pieces).fill(-1);
  for (let face = 0; face < mesh.faces; face++) {
    const start = mesh.starts[face];
    const piece = pieceOf[face];
    if (mesh.starts[face + 1] === start) continue;
    if (origin[piece] < 0) origin[piece] = 3 * mesh.vertexOf[start];
    const o = origin[piece];
    const a = 3 * mesh.vertexOf[start];
    const ax = p[a] - p[o], ay = p[a + 1] - p[o + 1], az = p[a + 2] - p[o + 2];
    for (let h = start + 1; h + 1 < mesh.starts[face + 1]; h++) {
      const b = 3 * mesh.vertexOf[h];
      const c = 3 * mesh.vertexOf[h + 1];
      const bx = p[b] - p[o], by = p[b + 1] - p[o + 1], bz = p[b + 2] - p[o + 2];
      const cx = p[c] - p[o], cy = p[c + 1] - p[o + 1], cz = p[c + 2] - p[o + 2];
      volumes[piece] += ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx);
    }
  }
  return volumes;
}
