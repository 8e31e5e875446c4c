import { MESH_EXTENSIONS, extensionOf, isMeshExtension, type MeshExtension } from './mesh-extensions';
import { MeshError } from './mesh-error';

/** What the bytes are; two extensions may stand for one kind, and `.usd` and `.usdz` for another each. */
export type MeshKind = 'obj' | 'usda' | 'usdc' | 'ply' | 'stl' | 'gltf' | 'glb' | 'archive';

/** So many bytes tell the kind. */
export const MAGIC_BYTES = 64;

const TITLES: Record<MeshKind, string> = { obj: 'OBJ', usda: 'USD text', usdc: 'a USD crate', ply: 'PLY', stl: 'STL', gltf: 'glTF text', glb: 'GLB', archive: 'a ZIP archive' };

const TAKES: Record<MeshExtension, MeshKind[]> = {
  obj: ['obj'],
  usd: ['usda', 'usdc'],
  usda: ['usda', 'usdc'],
  usdc: ['usdc', 'usda'],
  usdz: ['archive'],
  ply: ['ply'],
  stl: ['stl'],
  gltf: ['gltf', 'glb'],
  glb: ['glb', 'gltf'],
  zip: ['archive'],
};

/** The kind that the first bytes give away; null where they are like nothing in particular, as in an OBJ or a binary STL. */
export function kindOfBytes(head: Uint8Array): MeshKind | null {
  const text = String.fromCharCode(...head.subarray(0, MAGIC_BYTES)).replace(/^\u00ef\u00bb\u00bf/, '');
  if (text.startsWith('PK\u0003\u0004') || text.startsWith('PK\u0005\u0006')) return 'archive';
  if (text.startsWith('PXR-USDC')) return 'usdc';
  if (text.startsWith('#usda')) return 'usda';
  if (text.startsWith('glTF')) return 'glb';
  if (/^ply[\r\n]/.test(text)) return 'ply';
  if (/^\s*\{\s*"/.test(text)) return 'gltf';
  return null;
}

/**
 * How a file is to be read, by its name and its first bytes. A name without a known extension goes by the bytes alone; where bytes that say what they are
 * disagree with the name, the file is refused rather than guessed at. Errors: empty_file, unknown_format, wrong_format.
 */
export function detectMeshKind(name: string, head: Uint8Array): MeshKind {
  if (head.length === 0) throw new MeshError({ code: 'empty_file', detail: 'the file is empty' });
  const extension = extensionOf(name);
  const found = kindOfBytes(head);
  if (!isMeshExtension(extension)) {
    if (found) return found;
    const why = extension === '' ? 'the name has no extension' : `".${extension.slice(0, 40)}" is not one of them`;
    throw new MeshError({ code: 'unknown_format', detail: `files that can be read end in ${MESH_EXTENSIONS.map((one) => `.${one}`).join(', ')}; ${why}, and the bytes are of none that is known` });
  }
  const takes = TAKES[extension];
  // A binary STL's header is free text, which may begin like anything.
  if (found === null || extension === 'stl' || takes.includes(found)) return extension !== 'stl' && found !== null ? found : takes[0];
  throw new MeshError({ code: 'wrong_format', expected: TITLES[takes[0]], found: TITLES[found], detail: `expected ${TITLES[takes[0]]} by the name, found ${TITLES[found]}: rename the file`, offset: 0 });
}
