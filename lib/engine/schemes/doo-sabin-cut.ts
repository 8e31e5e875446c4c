import { cutOut } from './cut-out';
import { cageEdge, dooSabinMesh, type DooSabinMesh } from './doo-sabin-mesh';

/** A mesh with what is to be refined of it, by vertex (see `refineDooSabin`). */
export interface DooSabinCut {
  mesh: DooSabinMesh;
  pending: Uint8Array;
  keep: Uint8Array;
}

/** The faces around the vertices `keep`, as `cutOut` cuts them. */
export function cutOutDooSabin(mesh: DooSabinMesh, pending: Uint8Array, keep: Uint8Array): DooSabinCut {
  const { mesh: part, wanted, from } = cutOut(mesh, keep);
  if (from === null) return { mesh, pending, keep };
  const { vertices, sides } = from;
  const pick = <Values extends Int32Array | Float32Array | Uint8Array>(values: Values, out: Values): Values => {
    for (let v = 0; v < out.length; v++) out[v] = values[vertices[v]];
    return out;
  };
  const ofVertices = mesh.level > 0;
  // Meshes without a border have no entries of it.
  const rims = mesh.rimOf.length === 0 ? 0 : vertices.length;
  return {
    mesh: dooSabinMesh({
      ...part,
      bodyOf: ofVertices ? pick(mesh.bodyOf, new Int32Array(vertices.length)) : part.bodyOf,
      live: ofVertices ? pick(mesh.live, new Uint8Array(vertices.length)) : part.live,
      keepsCorners: mesh.keepsCorners,
      rimOf: pick(mesh.rimOf, new Int32Array(rims)),
      rimFrom: pick(mesh.rimFrom, new Float32Array(rims)),
      rimShare: pick(mesh.rimShare, new Float32Array(rims)),
      firstSpoke: mesh.firstSpoke,
      spokes: mesh.spokes,
      edgeOf: ofVertices ? null : sides.map((h) => cageEdge(mesh, h)),
    }),
    pending: pick(pending, new Uint8Array(vertices.length)),
    keep: wanted,
  };
}
