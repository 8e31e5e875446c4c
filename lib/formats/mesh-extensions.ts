/** Extensions of the mesh files that can be read, without the dot. */
export const MESH_EXTENSIONS = ['obj', 'usd', 'usda', 'usdc', 'usdz', 'ply', 'stl', 'gltf', 'glb', 'zip'] as const;
export type MeshExtension = (typeof MESH_EXTENSIONS)[number];

/** Lower-case extension of a file name, without the dot; empty when it has none. */
export function extensionOf(name: string): string {
  return /\.([^./\\]+)$/.exec(name)?.[1].toLowerCase() ?? '';
}

export function isMeshExtension(extension: string): extension is MeshExtension {
  return (MESH_EXTENSIONS as readonly string[]).includes(extension);
}
