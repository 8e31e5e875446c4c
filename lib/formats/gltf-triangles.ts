import type { Accessor } from '@gltf-transform/core';
import type { GltfDocument } from './gltf-document';
import { MeshError } from './mesh-error';

export type Primitive = NonNullable<GltfDocument['meshes']>[number]['primitives'][number];

const TRIANGLES = 4;
const STRIP = 5;
const FAN = 6;

/** How many triangles a primitive of so many corners has; 0 for points and lines. */
export function triangleCount(mode: number, corners: number): number {
  if (mode === TRIANGLES) return Math.floor(corners / 3);
  return mode === STRIP || mode === FAN ? Math.max(0, corners - 2) : 0;
}

/** The corners of a primitive's triangles, three each, in the order that has the outside counter-clockwise. `path` names it in messages. Errors: vertex_out_of_range. */
export function primitiveTriangles(primitive: Primitive, indices: Accessor | null, vertices: number, path: string): Uint32Array {
  const mode = primitive.mode ?? TRIANGLES;
  const given = indices?.getArray() ?? null;
  const count = triangleCount(mode, given?.length ?? vertices);
  const corners = new Uint32Array(3 * count);
  for (let t = 0; t < count; t++) {
    for (let k = 0; k < 3; k++) {
      // In a strip every second triangle has its last two corners exchanged; a fan shares its first vertex. [Khronos glTF 2.0, section 3.7.2.1, from memory]
      const turned = mode === STRIP && t % 2 === 1 && k > 0 ? 3 - k : k;
      const at = mode === TRIANGLES ? 3 * t + k : mode === STRIP ? t + turned : k === 0 ? 0 : t + k;
      const vertex = given ? given[at] : at;
      if (!(vertex < vertices)) throw new MeshError({ code: 'vertex_out_of_range', expected: `a vertex index from 0 to ${vertices - 1}`, found: String(vertex), detail: `glTF ${path}.indices: expected a vertex index from 0 to ${vertices - 1}, found ${vertex} at place ${at}` });
      corners[3 * t + k] = vertex;
    }
  }
  return corners;
}
