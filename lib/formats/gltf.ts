import { Logger, Verbosity, WebIO, type Accessor } from '@gltf-transform/core';
import type { Cage } from '../engine/cage';
import { bareCage, evenStarts, fileNote, oneLabel, trianglesOnlyNote } from './bare-cage';
import type { Beside } from './beside';
import { checkCoordinates } from './check-coordinates';
import { distinctNames } from './distinct-names';
import { openGltf } from './gltf-container';
import type { GltfDocument } from './gltf-document';
import { placeNodes } from './gltf-nodes';
import { jointMatrices, poseSkin, primitiveWeights } from './gltf-skin';
import { primitiveTriangles, triangleCount } from './gltf-triangles';
import { labelByJoint } from './label-by-joint';
import { mirrors, reverseFaces, transformPoints, type Matrix } from './matrix';
import { mergeCages } from './merge-cages';
import { MeshError } from './mesh-error';
import { MESH_LIMITS } from './mesh-limits';
import { collapsedNote } from './stl';
import { weldTriangles } from './weld-triangles';

interface Scene {
  document: GltfDocument;
  accessors: Accessor[];
  world: Matrix[];
  materials: string[];
}

/**
 * Reads the triangles of a glTF or GLB file's scene: every mesh of every node at its place, in metres and Y up as the format lays down. Nodes name objects and
 * groups, materials and skin joints their own labels. Equal vertices of a primitive's mesh are welded, since the format repeats them for normals and
 * texture coordinates. Source: Khronos, glTF 2.0 (from memory). Errors: MeshError with the JSON's path, or the byte in a GLB's frame.
 */
export async function readGltf(bytes: Uint8Array, beside: Beside): Promise<Cage> {
  const { document, buffers } = await openGltf(bytes, beside);
  const { world, shown } = placeNodes(document);
  const withMesh = shown.filter((node) => document.nodes![node].mesh !== undefined);
  refuseSize(document, withMesh);
  const scene = { document, accessors: await decodeAccessors(document, buffers), world, materials: distinctNames((document.materials ?? []).map((material) => material.name ?? ''), 'material') };
  const names = distinctNames(withMesh.map((node) => document.nodes![node].name ?? document.meshes![document.nodes![node].mesh!].name ?? ''), 'mesh');
  const cages = withMesh.flatMap((node, i) => readNode(scene, node, names[i]));
  if (cages.length === 0) throw new MeshError({ code: 'no_faces', expected: 'a triangle', detail: 'expected at least one triangle in the scene, found none' });
  const merged = mergeCages(cages);
  return { ...merged, metresPerUnit: 1, upAxis: 'y', warnings: [trianglesOnlyNote('glTF'), ...merged.warnings] };
}

/** The decoder lays arrays of floats over the bytes, which therefore have to begin at a multiple of four. */
function aligned(buffer: Uint8Array): Uint8Array<ArrayBuffer> {
  return buffer.byteOffset % 4 === 0 && buffer.buffer instanceof ArrayBuffer ? new Uint8Array(buffer.buffer, buffer.byteOffset, buffer.byteLength) : new Uint8Array(buffer);
}

async function decodeAccessors(document: GltfDocument, buffers: Uint8Array[]): Promise<Accessor[]> {
  const io = new WebIO().setLogger(new Logger(Verbosity.SILENT));
  const json = {
    asset: { version: '2.0' },
    buffers: (document.buffers ?? []).map(({ byteLength }, i) => ({ byteLength, uri: `buffer${i}` })),
    bufferViews: document.bufferViews ?? [],
    accessors: document.accessors ?? [],
  };
  const resources = Object.fromEntries(buffers.map((buffer, i) => [`buffer${i}`, aligned(buffer)]));
  try {
    const decoded = await io.readJSON({ json, resources });
    return decoded.getRoot().listAccessors();
  } catch (error) {
    throw new MeshError({ code: 'bad_gltf', detail: `glTF accessors: ${error instanceof Error ? error.message.slice(0, 200) : 'they cannot be decoded'}` });
  }
}

/** Refuses, before anything is set aside, more than a cage may have: a small file can place one mesh many thousand times. */
function refuseSize({ nodes = [], meshes = [], accessors = [] }: GltfDocument, withMesh: number[]): void {
  let [vertices, faces] = [0, 0];
  for (const node of withMesh) {
    for (const { attributes, indices, mode } of meshes[nodes[node].mesh!].primitives) {
      const count = attributes.POSITION === undefined ? 0 : accessors[attributes.POSITION].count;
      vertices += count;
      faces += triangleCount(mode ?? 4, indices === undefined ? count : accessors[indices].count);
    }
    const kind = vertices > MESH_LIMITS.vertices ? 'vertices' : faces > MESH_LIMITS.faces ? 'faces' : null;
    if (kind) throw new MeshError({ code: `too_many_${kind}`, expected: `at most ${MESH_LIMITS[kind]} ${kind}`, detail: `glTF nodes.${node}: expected at most ${MESH_LIMITS[kind]} ${kind} in the scene, found more` });
  }
}

function readNode(scene: Scene, node: number, name: string): Cage[] {
  const { document, accessors } = scene;
  const { mesh, skin } = document.nodes![node];
  const cages: Cage[] = [];
  document.meshes![mesh!].primitives.forEach((primitive, k) => {
    const path = `meshes.${mesh}.primitives.${k}`;
    const position = primitive.attributes.POSITION === undefined ? null : accessors[primitive.attributes.POSITION];
    if (!position || triangleCount(primitive.mode ?? 4, Infinity) === 0) return;
    if (position.getElementSize() !== 3 || position.getArray() === null) throw new MeshError({ code: 'bad_gltf', detail: `glTF ${path}.attributes.POSITION: expected three coordinates a vertex, found ${position.getArray() === null ? 'no data' : position.getType()}` });
    const vertices = position.getCount();
    const positions = new Float64Array(3 * vertices);
    const point = [0, 0, 0];
    for (let v = 0; v < vertices; v++) positions.set(position.getElement(v, point), 3 * v);
    const corners = primitiveTriangles(primitive, primitive.indices === undefined ? null : accessors[primitive.indices], vertices, path);
    const posed = placePoints(scene, node, skin, primitive, positions, corners, path);
    checkCoordinates(positions, `glTF ${path}: `, null);
    const starts = evenStarts(corners.length / 3, 3);
    const welded = weldTriangles(positions, corners);
    const faces = welded.faceOf.length;
    if (faces === 0) return;
    const joints = posed.weights && labelByJoint(starts, corners, posed.weights);
    const label = oneLabel(name, faces);
    cages.push({
      ...bareCage({ positions: welded.positions, faceStarts: evenStarts(faces, 3), faceVertices: welded.faceVertices }),
      groups: label,
      objects: label,
      materials: primitive.material === undefined ? null : oneLabel(scene.materials[primitive.material], faces),
      joints: joints && { names: joints.names, labels: welded.faceOf.map((face) => joints.labels[face]) },
      warnings: [...(welded.collapsed > 0 ? [collapsedNote(welded.collapsed)] : []), ...(posed.moved ? [fileNote('posed_skin', 'The joints stand elsewhere than where the skin was bound: it is measured as the file shows it.')] : [])],
    });
  });
  return cages.length > 1 ? [weldCage(mergeCages(cages))] : cages;

  function weldCage(cage: Cage): Cage {
    // A mesh comes as one primitive a material; where they meet they are one surface.
    const welded = weldTriangles(cage.positions, cage.faceVertices);
    return { ...cage, positions: welded.positions, faceVertices: welded.faceVertices };
  }
}

function placePoints({ document, accessors, world }: Scene, node: number, skin: number | undefined, primitive: NonNullable<GltfDocument['meshes']>[number]['primitives'][number], positions: Float64Array, corners: Uint32Array, path: string) {
  const bound = skin === undefined ? null : document.skins![skin];
  const names = bound && distinctNames(bound.joints.map((joint) => document.nodes![joint].name ?? ''), 'joint');
  const weights = names && primitiveWeights(primitive, accessors, positions.length / 3, names, path);
  if (!bound || !weights) {
    transformPoints(positions, world[node]);
    if (mirrors(world[node])) reverseFaces(evenStarts(corners.length / 3, 3), corners);
    return { weights: null, moved: false };
  }
  // The node of a skinned mesh does not move it, its joints do. [Khronos glTF 2.0, section 3.7.3.3, from memory]
  const matrices = jointMatrices(bound.joints, bound.inverseBindMatrices === undefined ? null : accessors[bound.inverseBindMatrices], world);
  if (mirrors(matrices[0])) reverseFaces(evenStarts(corners.length / 3, 3), corners);
  return { weights, moved: poseSkin(positions, weights, matrices) };
}
