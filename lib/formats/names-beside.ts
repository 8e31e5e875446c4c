import { extensionOf } from './mesh-extensions';
import { weightsName } from './joint-weights';

/** A text longer than this is geometry, not pointers to it, and is not looked through. */
export const MOST_SCANNED_BYTES = 64 * 1024 * 1024;
/** Files that one mesh may draw on, and names that one text may mention. */
const MOST_BESIDE = 1_000;
const MOST_MENTIONED = 10_000;

/** The folder of a path with its slash; empty at the top. */
export function folderOf(path: string): string {
  return path.slice(0, path.lastIndexOf('/') + 1);
}

/** A path that a file mentions, as seen from where that file's own path is seen from: `.` and `..` taken out; null where it leads out. */
export function pathFrom(file: string, mentioned: string): string | null {
  const parts: string[] = [];
  for (const part of `${folderOf(file)}${mentioned}`.split('/')) {
    if (part === '..') {
      if (parts.length === 0) return null;
      parts.pop();
    } else if (part !== '.' && part !== '') parts.push(part);
  }
  return parts.join('/');
}

/** Names that a glTF document or a text layer mentions, from its folder. Nothing is checked: what is not there is simply not found. */
function mentionedIn(extension: string, bytes: Uint8Array): string[] {
  if (bytes.length > MOST_SCANNED_BYTES) return [];
  const text = new TextDecoder().decode(bytes);
  const pattern = extension === 'gltf' ? /"uri"\s*:\s*"((?:[^"\\]|\\.){1,1024})"/g : /@([^@\n]{1,1024})@/g;
  const names = new Set<string>();
  for (const [, name] of text.matchAll(pattern)) {
    if (name.startsWith('data:')) continue;
    names.add(extension === 'gltf' ? decoded(name) : name);
    if (names.size >= MOST_MENTIONED) break;
  }
  return [...names];
}

function decoded(uri: string): string {
  try {
    return decodeURIComponent(uri.replaceAll('\\/', '/'));
  } catch {
    return uri;
  }
}

/** Extensions of files that may draw on others: an OBJ on its skin weights, a glTF on its buffers, a text layer on other layers. */
const MAY_DRAW = new Set(['obj', 'gltf', 'usd', 'usda']);
const LAYERS = new Set(['usd', 'usda', 'usdc']);

export function mayDrawOnOthers(name: string): boolean {
  return MAY_DRAW.has(extensionOf(name));
}

/**
 * The files that a mesh draws on, directly or through others, by their paths: those of `has` that it mentions. A binary layer's own pointers are not followed.
 * `read` gives the bytes of a path that `has` knows. Errors: those of `read`.
 */
export async function namesBeside(mesh: string, has: (path: string) => boolean, read: (path: string) => Promise<Uint8Array>): Promise<string[]> {
  if (extensionOf(mesh) === 'obj') {
    const weights = pathFrom(mesh, weightsName(mesh));
    return weights !== null && has(weights) ? [weights] : [];
  }
  const found = new Set<string>();
  const open = [mesh];
  for (let file = open.pop(); file !== undefined; file = open.pop()) {
    const extension = extensionOf(file);
    if (!mayDrawOnOthers(file) || extension === 'obj') continue;
    for (const mentioned of mentionedIn(extension, await read(file))) {
      const path = pathFrom(file, mentioned);
      const isWanted = path !== null && path !== mesh && !found.has(path) && has(path) && (extension === 'gltf' || LAYERS.has(extensionOf(path)));
      if (!isWanted) continue;
      if (found.size >= MOST_BESIDE) return [...found].sort();
      found.add(path);
      open.push(path);
    }
  }
  return [...found].sort();
}
