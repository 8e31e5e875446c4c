import type { CrateBytes } from './crate-bytes';
import { MOST_USD_DEPTH } from './usd-prim';

/** The tree of a crate's paths, by each path's number. */
export interface CratePaths {
  /** Number of the path that it lies in; -1 for the root and for numbers that no entry has. */
  parent: Int32Array;
  /** Last name of the path; empty for the root. */
  names: string[];
  isProperty: Uint8Array;
}

/**
 * Unpacks the section of paths: each entry names its path's number, its last name (negative for a property), and whether a child follows (-1), a sibling (0),
 * both (how far on the sibling stands) or neither (-2). Errors: MeshError with the byte, for entries that do not make one tree.
 */
export function readCratePaths(reader: CrateBytes, tokens: string[], most: number): CratePaths {
  const start = reader.at;
  const count = reader.uint64();
  const packed = reader.uint64();
  if (count > most || packed > count) throw reader.fail('bad_count', `at most ${Math.min(most, count)} paths`, Math.max(count, packed), start);
  const [numbers, elements, jumps] = ['path numbers', 'path names', 'path jumps'].map((what) => reader.integers(packed, what));
  const paths: CratePaths = { parent: new Int32Array(count).fill(-1), names: Array<string>(count).fill(''), isProperty: new Uint8Array(count) };
  const seen = new Uint8Array(packed);
  // Entries that are still to be walked, with the path that they lie in and their depth.
  const open: [entry: number, parent: number, depth: number][] = packed > 0 ? [[0, -1, 0]] : [];
  for (let next = open.pop(); next; next = open.pop()) {
    const [entry, parent, depth] = next;
    if (entry >= packed || seen[entry] === 1) throw reader.fail('bad_paths', 'a tree of paths', `entry ${entry} ${entry >= packed ? 'beyond the last' : 'twice'}`, start);
    if (depth > MOST_USD_DEPTH) throw reader.fail('too_deep', `paths nested at most ${MOST_USD_DEPTH} deep`, depth, start);
    seen[entry] = 1;
    const path = numbers[entry];
    const element = elements[entry];
    const name = parent < 0 ? '' : tokens[Math.abs(element)];
    if (!(path >= 0 && path < count) || name === undefined) throw reader.fail('bad_paths', 'a path and a name that are there', `path ${path}, name ${element}`, start);
    paths.parent[path] = parent;
    paths.names[path] = name;
    paths.isProperty[path] = element < 0 && parent >= 0 ? 1 : 0;
    const jump = jumps[entry];
    if (jump >= 0) open.push([jump > 0 ? entry + jump : entry + 1, parent, depth]);
    if (jump > 0 || jump === -1) open.push([entry + 1, path, depth + 1]);
  }
  return paths;
}

/** The whole path of a number, such as `/a/b.c`; null where there is none. */
export function cratePath({ parent, names, isProperty }: CratePaths, index: number): string | null {
  if (!(index >= 0 && index < names.length)) return null;
  let path = '';
  for (let at = index; at >= 0 && names[at] !== ''; at = parent[at]) path = `${isProperty[at] === 1 ? '.' : '/'}${names[at]}${path}`;
  return path === '' ? '/' : path;
}
