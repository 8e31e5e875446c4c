import { levelMesh, type LevelMesh } from './level-mesh';

/** Part of a mesh's half-edges up to which cutting out what a refinement reads is worth its own passes. */
const WORTH = 1 / 2;

/** A mesh, what is wanted of it (1 by vertex), and where it was cut from one, that one's vertices and half-edges by its own. */
export interface CutOut {
  mesh: LevelMesh;
  wanted: Uint8Array;
  from: { vertices: readonly number[]; sides: Int32Array } | null;
}

/**
 * The faces that touch a wanted vertex (1 in `wanted`), in the mesh's order: all that a local refinement reads, so that its cost follows what is left of the
 * mesh and not the whole of it. The whole where that is most of it. Edges that no wanted vertex ends have nothing across.
 */
export function cutOut(mesh: LevelMesh, wanted: Uint8Array): CutOut {
  const { starts, vertexOf, positions } = mesh;
  const faces: number[] = [];
  let sides = 0;
  for (let face = 0; face < mesh.faces; face++) {
    for (let h = starts[face]; h < starts[face + 1]; h++) {
      if (wanted[vertexOf[h]] === 0) continue;
      faces.push(face);
      sides += starts[face + 1] - starts[face];
      break;
    }
    if (sides > WORTH * vertexOf.length) return { mesh, wanted, from: null };
  }
  const part = {
    starts: new Int32Array(faces.length + 1), vertexOf: new Int32Array(sides), faceOf: new Int32Array(sides), twin: new Int32Array(sides).fill(-1),
    edgeSharpness: new Float32Array(sides), bodyOf: new Int32Array(faces.length), live: new Uint8Array(faces.length), borderOf: new Int32Array(sides),
    borderFrom: new Float32Array(sides),
  };
  const sideOf = new Int32Array(vertexOf.length);
  const sidesFrom = new Int32Array(sides);
  const newOf = new Int32Array(mesh.vertices);
  const oldOf: number[] = [];
  let to = 0;
  for (let i = 0; i < faces.length; i++) {
    const face = faces[i];
    part.bodyOf[i] = mesh.bodyOf[face];
    part.live[i] = mesh.live[face];
    for (let h = starts[face]; h < starts[face + 1]; h++, to++) {
      const vertex = vertexOf[h];
      if (newOf[vertex] === 0) newOf[vertex] = oldOf.push(vertex);
      part.vertexOf[to] = newOf[vertex] - 1;
      part.faceOf[to] = i;
      part.edgeSharpness[to] = mesh.edgeSharpness[h];
      part.borderOf[to] = mesh.borderOf[h];
      part.borderFrom[to] = mesh.borderFrom[h];
      sidesFrom[to] = h;
      sideOf[h] = to + 1;
      const twin = mesh.twin[h];
      // The later of two sides knows both.
      if (twin < 0 || sideOf[twin] === 0) continue;
      part.twin[to] = sideOf[twin] - 1;
      part.twin[sideOf[twin] - 1] = to;
    }
    part.starts[i + 1] = to;
  }
  const points = new Float64Array(3 * oldOf.length);
  const vertexSharpness = new Float32Array(oldOf.length);
  const ownWanted = new Uint8Array(oldOf.length);
  for (let v = 0; v < oldOf.length; v++) {
    const old = oldOf[v];
    for (let axis = 0; axis < 3; axis++) points[3 * v + axis] = positions[3 * old + axis];
    vertexSharpness[v] = mesh.vertexSharpness[old];
    ownWanted[v] = wanted[old];
  }
  return {
    mesh: levelMesh({ ...part, faces: faces.length, vertices: oldOf.length, positions: points, vertexSharpness, level: mesh.level }), wanted: ownWanted,
    from: { vertices: oldOf, sides: sidesFrom },
  };
}
