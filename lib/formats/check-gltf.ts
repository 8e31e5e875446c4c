import type { GltfDocument } from './gltf-document';
import { MeshError } from './mesh-error';

const COMPONENT_BYTES = new Map([[5120, 1], [5121, 1], [5122, 2], [5123, 2], [5125, 4], [5126, 4]]);
const COMPONENTS = new Map([['SCALAR', 1], ['VEC2', 2], ['VEC3', 3], ['VEC4', 4], ['MAT2', 4], ['MAT3', 9], ['MAT4', 16]]);
const MOST_DEPTH = 512;
/** Accessors may overlap in a buffer, but not so often that a small file asks for a large memory. */
const MOST_OVERLAP = 4;
const SPARE_BYTES = 1 << 20;

function bad(path: string, detail: string): MeshError {
  return new MeshError({ code: 'bad_gltf', detail: `glTF ${path}: ${detail}` });
}

/**
 * Refuses references that lead nowhere, views and accessors beyond their buffers, more accessors than the bytes can hold, and nodes in a circle, under two
 * parents or nested too deep: the library that decodes the document takes these on trust. Source: Khronos, glTF 2.0, sections 3.5 and 3.6 (from memory).
 * `held` are the bytes of each buffer. Errors: bad_gltf with the path of the property, too_deep, too_large.
 */
export function checkGltf(document: GltfDocument, held: number[]): void {
  checkViews(document, held);
  checkAccessors(document, held.reduce((sum, bytes) => sum + bytes, 0));
  checkReferences(document);
  checkNodes(document);
}

function checkViews({ bufferViews = [], buffers = [] }: GltfDocument, held: number[]): void {
  buffers.forEach((buffer, i) => {
    if (buffer.byteLength > held[i]) throw bad(`buffers.${i}.byteLength`, `expected at most the ${held[i]} bytes that are there, found ${buffer.byteLength}`);
  });
  bufferViews.forEach((view, i) => {
    if (view.buffer >= buffers.length) throw bad(`bufferViews.${i}.buffer`, `expected one of ${buffers.length} buffers, found ${view.buffer}`);
    const end = (view.byteOffset ?? 0) + view.byteLength;
    if (end > buffers[view.buffer].byteLength) throw bad(`bufferViews.${i}`, `expected at most ${buffers[view.buffer].byteLength} bytes in buffer ${view.buffer}, found a view to byte ${end}`);
  });
}

function checkAccessors({ accessors = [], bufferViews = [] }: GltfDocument, bytes: number): void {
  let total = 0;
  const inView = (path: string, view: number | undefined, byteOffset: number, count: number, size: number, strided: boolean) => {
    if (view === undefined) return;
    if (view >= bufferViews.length) throw bad(path, `expected one of ${bufferViews.length} buffer views, found ${view}`);
    const { byteLength, byteStride } = bufferViews[view];
    const end = byteOffset + ((strided ? byteStride : undefined) ?? size) * (count - 1) + size;
    if (end > byteLength) throw bad(path, `expected at most ${byteLength} bytes in buffer view ${view}, found ${count} elements to byte ${end}`);
  };
  accessors.forEach((accessor, i) => {
    const component = COMPONENT_BYTES.get(accessor.componentType)!;
    const size = component * COMPONENTS.get(accessor.type)!;
    inView(`accessors.${i}`, accessor.bufferView, accessor.byteOffset ?? 0, accessor.count, size, true);
    const { sparse } = accessor;
    if (sparse) {
      if (sparse.count > accessor.count) throw bad(`accessors.${i}.sparse.count`, `expected at most ${accessor.count}, found ${sparse.count}`);
      inView(`accessors.${i}.sparse.indices`, sparse.indices.bufferView, sparse.indices.byteOffset ?? 0, sparse.count, COMPONENT_BYTES.get(sparse.indices.componentType)!, false);
      inView(`accessors.${i}.sparse.values`, sparse.values.bufferView, sparse.values.byteOffset ?? 0, sparse.count, size, false);
    }
    total += accessor.count * size;
    if (total > MOST_OVERLAP * bytes + SPARE_BYTES) throw new MeshError({ code: 'too_large', detail: `glTF accessors.${i}: expected accessors of about the ${bytes} bytes that the buffers hold, found ${total}` });
  });
}

function checkReferences({ scene, scenes = [], nodes = [], meshes = [], materials = [], skins = [], accessors = [] }: GltfDocument): void {
  const within = (path: string, kind: string, found: number | undefined, count: number) => {
    if (found !== undefined && found >= count) throw bad(path, `expected one of ${count} ${kind}, found ${found}`);
  };
  within('scene', 'scenes', scene, scenes.length);
  scenes.forEach((one, i) => one.nodes?.forEach((node, k) => within(`scenes.${i}.nodes.${k}`, 'nodes', node, nodes.length)));
  nodes.forEach((node, i) => {
    within(`nodes.${i}.mesh`, 'meshes', node.mesh, meshes.length);
    within(`nodes.${i}.skin`, 'skins', node.skin, skins.length);
    node.children?.forEach((child, k) => within(`nodes.${i}.children.${k}`, 'nodes', child, nodes.length));
  });
  skins.forEach((skin, i) => {
    within(`skins.${i}.inverseBindMatrices`, 'accessors', skin.inverseBindMatrices, accessors.length);
    within(`skins.${i}.skeleton`, 'nodes', skin.skeleton, nodes.length);
    skin.joints.forEach((joint, k) => within(`skins.${i}.joints.${k}`, 'nodes', joint, nodes.length));
    const matrices = skin.inverseBindMatrices === undefined ? null : accessors[skin.inverseBindMatrices];
    if (matrices && (matrices.type !== 'MAT4' || matrices.count < skin.joints.length)) throw bad(`skins.${i}.inverseBindMatrices`, `expected ${skin.joints.length} 4 × 4 matrices, found ${matrices.count} of ${matrices.type}`);
  });
  meshes.forEach((mesh, i) =>
    mesh.primitives.forEach((primitive, k) => {
      const path = `meshes.${i}.primitives.${k}`;
      within(`${path}.indices`, 'accessors', primitive.indices, accessors.length);
      within(`${path}.material`, 'materials', primitive.material, materials.length);
      for (const [attribute, accessor] of Object.entries(primitive.attributes)) within(`${path}.attributes.${attribute.slice(0, 40)}`, 'accessors', accessor, accessors.length);
    }),
  );
}

function checkNodes({ nodes = [], scenes = [] }: GltfDocument): void {
  const parent = new Int32Array(nodes.length).fill(-1);
  nodes.forEach((node, i) =>
    node.children?.forEach((child, k) => {
      if (parent[child] >= 0) throw bad(`nodes.${i}.children.${k}`, `expected a node with one parent, found node ${child}, which node ${parent[child]} has too`);
      parent[child] = i;
    }),
  );
  for (let i = 0; i < nodes.length; i++) {
    let depth = 0;
    for (let node = i; node >= 0; node = parent[node]) {
      if (++depth > Math.min(nodes.length, MOST_DEPTH)) {
        if (depth > nodes.length) throw bad(`nodes.${i}`, 'expected a tree of nodes, found a circle');
        throw new MeshError({ code: 'too_deep', detail: `glTF nodes.${i}: expected nodes nested at most ${MOST_DEPTH} deep, found more` });
      }
    }
  }
  scenes.forEach((scene, i) => {
    if (new Set(scene.nodes ?? []).size !== (scene.nodes ?? []).length) throw bad(`scenes.${i}.nodes`, 'expected each node once');
  });
}
