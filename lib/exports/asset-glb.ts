import { Document, NodeIO, Primitive, type Buffer as GltfBuffer } from '@gltf-transform/core';
import type { Cage, Partition } from '@/lib/engine/cage';
import type { DisplayMesh } from '@/lib/engine/display';
import { partitionFaces } from '@/lib/engine/mesh/partition';
import { buildTopology, nextHalfEdge } from '@/lib/engine/mesh/topology';

/**
 * An asset's display mesh as a binary glTF file: metres, the asset's axes (whatever is up in its show). Under one root node, which
 * carries the mesh's origin, stand two nodes a part, both named for it: `extras.kind` is `surface` (triangles of the limit surface
 * with normals) or `cage` (the control cage's edges as lines); `extras.part` is the part's name as it is.
 * `metresPerUnit` includes the asset's scale.
 */
export async function assetGlb(cage: Cage, mesh: DisplayMesh, partsBy: Partition, metresPerUnit: number): Promise<Uint8Array> {
  const document = new Document();
  const buffer = document.createBuffer();
  const [x, y, z] = mesh.origin.map((value) => value * metresPerUnit);
  const root = document.createNode('asset').setTranslation([x, y, z]);
  document.createScene('asset').addChild(root);
  const positions = mesh.positions.map((value) => value * metresPerUnit);
  for (const part of mesh.parts) {
    if (part.indexCount === 0) continue;
    const from = 3 * part.firstVertex;
    const to = from + 3 * part.vertexCount;
    const indices = mesh.indices.slice(part.firstIndex, part.firstIndex + part.indexCount).map((index) => index - part.firstVertex);
    const primitive = document
      .createPrimitive()
      .setAttribute('POSITION', vectors(document, buffer, positions.slice(from, to)))
      .setAttribute('NORMAL', vectors(document, buffer, mesh.normals.slice(from, to)))
      .setIndices(numbers(document, buffer, indices));
    root.addChild(partNode(document, part.name, 'surface', primitive));
  }
  const corners = vectors(document, buffer, Float32Array.from(cage.positions, (value, i) => (value - mesh.origin[i % 3]) * metresPerUnit));
  for (const [name, edges] of cageEdges(cage, partsBy)) {
    const lines = document.createPrimitive().setMode(Primitive.Mode.LINES).setAttribute('POSITION', corners).setIndices(numbers(document, buffer, Uint32Array.from(edges)));
    root.addChild(partNode(document, name, 'cage', lines));
  }
  return new NodeIO().writeBinary(document);
}

function vectors(document: Document, buffer: GltfBuffer, values: Float32Array) {
  return document.createAccessor().setType('VEC3').setArray(values).setBuffer(buffer);
}

function numbers(document: Document, buffer: GltfBuffer, values: Uint32Array) {
  return document.createAccessor().setType('SCALAR').setArray(values).setBuffer(buffer);
}

function partNode(document: Document, part: string, kind: 'surface' | 'cage', primitive: Primitive) {
  return document
    .createNode(part)
    .setExtras({ kind, part })
    .setMesh(document.createMesh(part).addPrimitive(primitive));
}

/** Vertex pairs of each part's edges, once an edge; a border between two parts stands in both. */
function cageEdges(cage: Cage, partsBy: Partition): Map<string, number[]> {
  const { mesh } = buildTopology(cage);
  const { partNames, partOf, holePart } = partitionFaces(cage, mesh, partsBy);
  const edges = new Map<string, number[]>();
  for (let h = 0; h < mesh.vertexOf.length; h++) {
    const twin = mesh.twin[h];
    const part = partOf[mesh.faceOf[h]];
    if (part === holePart) continue;
    if (twin >= 0 && twin < h && partOf[mesh.faceOf[twin]] === part) continue;
    const pair = [mesh.vertexOf[h], mesh.vertexOf[nextHalfEdge(mesh, h)]];
    const list = edges.get(partNames[part]);
    if (list) list.push(...pair);
    else edges.set(partNames[part], pair);
  }
  return edges;
}
