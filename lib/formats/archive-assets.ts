import type { Archive } from './open-archive';
import { extensionOf, isMeshExtension } from './mesh-extensions';
import { MOST_SCANNED_BYTES, namesBeside } from './names-beside';

/** What an archive holds, sorted by name. */
export interface ArchiveContent {
  /** Mesh files that stand for themselves. */
  meshes: string[];
  /** Files that those draw on: skin weights, buffers, layers. A mesh file that another one draws on is no asset of its own. */
  beside: string[];
  /** Archives in the archive. A `.usdz` is a mesh file and none of these. */
  nested: string[];
}

/** Whether an entry counts: not what an archiver or a desktop left beside the files. */
export function isFileOfArchive(entry: string): boolean {
  return !/(^|\/)(__MACOSX\/|\.)/.test(entry);
}

/**
 * Sorts an archive's files into meshes and what they draw on. Several layers that refer to each other are one asset; in a circle of them each is one.
 * An entry that cannot be read draws on nothing: its own reading says what is wrong.
 */
export async function archiveContent(archive: Pick<Archive, 'names' | 'sizeOf' | 'read'>): Promise<ArchiveContent> {
  const files = archive.names.filter(isFileOfArchive).sort();
  const known = new Set(files);
  const candidates = files.filter((file) => isMeshExtension(extensionOf(file)) && extensionOf(file) !== 'zip');
  const scan = (path: string) => (archive.sizeOf(path) > MOST_SCANNED_BYTES ? Promise.resolve(new Uint8Array(0)) : archive.read(path));
  const beside = new Set<string>();
  for (const mesh of candidates) {
    const names = await namesBeside(mesh, (path) => known.has(path), scan).catch(() => []);
    for (const name of names) beside.add(name);
  }
  const free = candidates.filter((mesh) => !beside.has(mesh));
  const meshes = free.length > 0 ? free : candidates;
  return { meshes, beside: [...beside].filter((name) => !meshes.includes(name)).sort(), nested: files.filter((file) => extensionOf(file) === 'zip') };
}
