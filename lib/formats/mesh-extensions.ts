/** Extensions of the mesh files that can be read, without the dot. */
export const MESH_EXTENSIONS = ['obj', 'usd', 'usda', 'usdc', 'usdz', 'ply', 'stl', 'gltf', 'glb', 'zip'] as const;
export type MeshExtension = (typeof MESH_EXTENSIONS)[number];

/** Lower-case extension of a file name, without the dot; empty when it has none. */
export function extensionOf(name: string): string {
  return /\.([^./\\]+)$/.exec(name)?.[1].toLowerCase() ?? '';
}

/** Formats that say neither what a unit is nor which way is up. */
const WITHOUT_SPACE = new Set(['obj', 'ply', 'stl']);

/** Whether a file of this name may state its unit and up axis. */
export function statesSpace(name: string): boolean {
  return !WITHOUT_SPACE.has(extensionOf(name));
}

export function isMeshExtension(extension: string): extension is MeshExtension {
  return (MESH_EXTENSIONS as readonly string[]).includes(extension);
}
