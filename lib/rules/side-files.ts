/** Files that are read with a mesh beside them and are no assets of their own: skin weights of an OBJ, buffers of a glTF. */
const WEIGHTS = /\.weights\.csv$/i;
const BUFFER = /\.bin$/i;

export function isSideFile(name: string): boolean {
  return WEIGHTS.test(name) || BUFFER.test(name);
}

/** What the mesh that reads a side file may be called: skin weights belong to one OBJ, buffers to any glTF of the drop. */
export function meshOfSideFile(name: string): { pattern: RegExp; inWords: string } {
  if (!WEIGHTS.test(name)) return { pattern: /\.gltf$/i, inWords: 'a .gltf' };
  const mesh = name.replace(WEIGHTS, '.obj');
  return { pattern: new RegExp(`^${mesh.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}$`, 'i'), inWords: mesh.replace(/^.*\//, '') };
}
