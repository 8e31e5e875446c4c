import type { Cage } from '@/lib/engine/cage';
import type { MeasureOptions } from '@/lib/engine/measured';
import { buildTopology } from '@/lib/engine/mesh/topology';
import { refineAround } from '@/lib/engine/schemes/catmull-clark-refine';
import { dooSabinCage } from '@/lib/engine/schemes/doo-sabin-mesh';
import { refineDooSabin } from '@/lib/engine/schemes/doo-sabin-refine';
import { levelZero, type LevelMesh } from '@/lib/engine/schemes/level-mesh';
import { refineTriangles } from '@/lib/engine/schemes/loop-refine';

/** The whole cage after so many refinements. */
function refined(cage: Cage, options: MeasureOptions, refinements: number): LevelMesh {
  const { mesh } = buildTopology(cage);
  let level = levelZero(mesh, cage.positions, new Int32Array(mesh.faces), new Uint8Array(1), options.boundary);
  if (options.scheme === 'doo-sabin') {
    let dual = dooSabinCage(level, options.boundary);
    for (let i = 0; i < refinements; i++) {
      const all = new Uint8Array(dual.vertices).fill(1);
      dual = refineDooSabin(dual, all, all);
    }
    return dual;
  }
  for (let i = 0; i < refinements; i++) level = options.scheme === 'loop' ? refineTriangles(level, options) : refineAround(level, options);
  return level;
}

/** The plain alternative: refine the whole cage so many times, then sum tetrahedra from the origin. Returns the volume. */
export function plainVolume(cage: Cage, options: MeasureOptions, refinements: number): number {
  const level = refined(cage, options, refinements);
  const p = level.positions;
  let six = 0;
  for (let face = 0; face < level.faces; face++) {
    const start = level.starts[face];
    const a = 3 * level.vertexOf[start];
    for (let h = start + 1; h + 1 < level.starts[face + 1]; h++) {
      const b = 3 * level.vertexOf[h];
      const c = 3 * level.vertexOf[h + 1];
      six += p[a] * (p[b + 1] * p[c + 2] - p[b + 2] * p[c + 1]) + p[a + 1] * (p[b + 2] * p[c] - p[b] * p[c + 2]) + p[a + 2] * (p[b] * p[c + 1] - p[b + 1] * p[c]);
    }
  }
  return six / 6;
}
